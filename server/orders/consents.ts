import { UniqueConstraintError } from 'sequelize';
import type { z } from 'zod';
import type { procedureConsentRequest } from '../../shared/contracts/orders';
import { isLanguageId } from '../../shared/languages/languages';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { mayConsentFor } from '../children/family-members';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { invalid, Problem, type FieldError } from '../http/problem';
import { ProcedureConsent } from './order-model';
import { noteChange, orderInReach } from './orders';

export type ConsentDetails = z.output<typeof procedureConsentRequest>;

/**
 * Writes down a guardian's consent to the procedure and to holding the child. The same consent again changes nothing.
 * @throws Problem 422 when the family member cannot consent for this child; 409 'consent-known' when another is there
 */
export async function addConsent(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  orderId: number,
  consent: ConsentDetails,
): Promise<void> {
  const { db, clock } = context;
  const order = await orderInReach(db, staff, orderId);
  const errors: FieldError[] = [];
  const mayConsent = await mayConsentFor(order.childId, consent.familyMemberId);
  if (mayConsent === null)
    errors.push({ path: 'familyMemberId', message: 'Choose an adult of this child.' });
  else if (!mayConsent)
    errors.push({
      path: 'familyMemberId',
      message: 'This adult may bring the child but cannot consent. Ask a guardian who can.',
    });
  if (Date.parse(consent.givenAt) > clock.now())
    errors.push({ path: 'givenAt', message: 'This time lies in the future.' });
  if (!isLanguageId(consent.language))
    errors.push({ path: 'language', message: 'Choose a language of the list.' });
  if (errors.length > 0) throw invalid(errors);

  try {
    await inTransaction(db, async (transaction) => {
      await ProcedureConsent.create(
        { ...consent, orderId, givenAt: new Date(consent.givenAt), recordedByStaffId: staff.id },
        { transaction },
      );
      await noteChange(context, transaction, actor, 'consent', order.childId, orderId);
    });
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    const known = await ProcedureConsent.findOne({ where: { orderId } });
    const isSame =
      known?.familyMemberId === consent.familyMemberId &&
      known.givenAt.getTime() === Date.parse(consent.givenAt);
    if (!isSame)
      throw new Problem(409, 'consent-known', 'A consent is on record for this order already.');
  }
}
