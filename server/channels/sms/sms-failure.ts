import { DeliveryFailure } from '../delivery-failure';
import { providerCode } from './provider-codes';

/** The request did not reach the provider. */
const neverArrived = new Set([
  'ECONNREFUSED',
  'ENOTFOUND',
  'EAI_AGAIN',
  'EHOSTUNREACH',
  'ENETUNREACH',
]);

/**
 * Reads an error of the SDK. A REST error carries `status` and the provider's `code`
 * (https://www.twilio.com/docs/api/errors); a network error carries a name like ECONNRESET.
 */
export function failureOfSms(error: unknown): DeliveryFailure {
  if (error instanceof DeliveryFailure) return error;
  const { status, code, message } = error as {
    status?: unknown;
    code?: unknown;
    message?: unknown;
  };
  const says = `The text service: ${typeof message === 'string' ? message : 'no reason given'}`;
  const name = typeof code === 'string' || typeof code === 'number' ? String(code) : 'no-code';
  if (typeof status !== 'number')
    return new DeliveryFailure(neverArrived.has(name) ? 'later' : 'unknown', name, says);
  if (status >= 500) return new DeliveryFailure('unknown', name, says);
  const known = providerCode(name);
  if (known)
    return new DeliveryFailure(known.kind === 'refused' ? 'refused' : 'later', name, known.says);
  // Too many at once, or our own account is not let in: nothing is wrong with this number.
  if (status === 429 || status === 401 || status === 403)
    return new DeliveryFailure('later', name, says);
  return new DeliveryFailure('refused', name, says);
}
