import { select } from '../database/connection';
import { DeliveryFailure } from '../channels/delivery-failure';
import type { SmsChannel } from '../channels/sms/sms-channel';
import { mostAttempts } from './back-off';
import type { ClaimedMessage } from './claimed-message';
import { keepInDoubt, settleGivenUp, settleQueuedAgain, settleSent, type Settling } from './settle';

/** The provider is asked again after this while it gives no answer. */
const askAgainAfterMs = 30_000;

/**
 * Brings a message to an end whose attempt was cut off. A text is looked up at the provider before it is sent again,
 * because it can neither be taken back nor marked; a mail goes again under the same Message-ID.
 */
export async function recover(
  settling: Settling,
  message: ClaimedMessage,
  sms: SmsChannel,
  realNow: number,
): Promise<void> {
  if (message.channel === 'sms') {
    try {
      const taken = await unknownSoFar(settling, await foundAtProvider(message, sms));
      if (taken) {
        await settleSent(settling, message, taken);
        return;
      }
    } catch (error) {
      if (!(error instanceof DeliveryFailure)) throw error;
      if (settling.now > message.lastUsefulAt.getTime())
        await settleGivenUp(settling, message, {
          code: 'outcome-unknown',
          says: 'Nobody can say whether this text went out.',
        });
      else
        await keepInDoubt(settling, message, { failure: error, askAt: realNow + askAgainAfterMs });
      return;
    }
  }
  if (message.attempts >= mostAttempts)
    await settleGivenUp(settling, message, {
      code: 'cut-off',
      says: 'Every attempt was cut off.',
    });
  else await settleQueuedAgain(settling, message);
}

const foundAtProvider = (message: ClaimedMessage, sms: SmsChannel) =>
  // It cannot have gone out before it was due, and the same words sent earlier are another message.
  sms.find({ to: message.address, body: message.body, since: message.dueAt.getTime() });

/** The same words can have gone to the same number for another message, such as an answer to HELP. */
async function unknownSoFar(
  { db }: Settling,
  found: readonly { readonly providerId: string; readonly segments: number | null }[],
) {
  if (found.length === 0) return undefined;
  const known = await select<{ provider_id: string }>(
    db,
    'SELECT provider_id FROM message_attempts WHERE provider_id IN (:ids)',
    { ids: found.map(({ providerId }) => providerId) },
  );
  const ids = new Set(known.map((row) => row.provider_id));
  return found.find(({ providerId }) => !ids.has(providerId));
}
