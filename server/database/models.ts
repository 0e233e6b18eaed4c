import type { Sequelize } from 'sequelize';
import { initChildModels } from '../children/child-model';
import { initFamilyMemberModels } from '../children/family-member-model';
import { initOrderModels } from '../orders/order-model';
import { initSeriesModels } from '../series/series-model';

/** The one list of models. Called once for a connection, before anything is read or written through a model. */
export function initModels(db: Sequelize): void {
  initChildModels(db);
  initFamilyMemberModels(db);
  initOrderModels(db);
  initSeriesModels(db);
}
