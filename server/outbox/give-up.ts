import type { Sequelize, Transaction } from 'sequelize';
import { change } from '../database/connection';
import { announce } from '../live/announce';
import type { ClaimedMessage } from './claimed-message';

export interface FailureSays {
  readonly code: string;
  readonly says: string;
  /** Business clock, epoch milliseconds. */
  readonly at: number;
}

/** What a person must know about a message that did not reach anybody. */
export type GivenUpMessage = Pick<
  ClaimedMessage,
  'id' | 'kind' | 'channel' | 'householdId' | 'familyMemberId' | 'staffId' | 'morningOn'
> & { readonly callReason: string; readonly failure: FailureSays };

/** Puts a call onto the list, in the transaction that gives the message up. The outbox knows no calls: the worker joins them. */
export type GiveUp = (transaction: Transaction, message: GivenUpMessage) => Promise<void>;

/**
 * Ends a message for good and tells a person when somebody must call.
 * 'given-up': we stopped trying. 'failed': the provider had taken it and reports that it did not arrive.
 */
export async function giveUpOn(
  db: Sequelize,
  transaction: Transaction,
  giveUp: GiveUp,
  message: Omit<GivenUpMessage, 'callReason' | 'failure'> & { readonly callReason: string | null },
  failure: FailureSays,
  state: 'given-up' | 'failed' = 'given-up',
): Promise<void> {
  await change(
    db,
    `UPDATE messages SET state = :state, failure_code = :code, failure_says = :says, claimed_by = NULL,
       claimed_until = NULL, ended_at = :at WHERE id = :id`,
    {
      id: message.id,
      state,
      at: new Date(failure.at),
      code: failure.code.slice(0, 40),
      says: failure.says.slice(0, 300),
    },
    transaction,
  );
  if (message.callReason !== null)
    await giveUp(transaction, { ...message, callReason: message.callReason, failure });
  await announce(db, transaction, 'messages', message.id);
}
