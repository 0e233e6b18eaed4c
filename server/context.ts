import type { Logger } from 'pino';
import type { Sequelize } from 'sequelize';
import type { Clock } from './clock/clock';
import type { Settings } from './config/settings';
import type { Printer } from './printing/printer';

/** Everything a use-case needs from its surroundings: built once at start, handed down, never a singleton. */
export interface Context {
  readonly settings: Settings;
  readonly db: Sequelize;
  readonly clock: Clock;
  readonly log: Logger;
  /** `openPrinter(settings.chromium)`; closed with the process. */
  readonly printer: Printer;
}
