import { DeliveryFailure } from '../delivery-failure';

/**
 * Reads an error of the mail library: `responseCode` is the mail server's answer (RFC 5321, 4.2.1: 5yz is permanent).
 * Nothing is unknown here: a mail that may have been taken is sent again under the same Message-ID.
 */
export function failureOfMail(error: unknown): DeliveryFailure {
  const { responseCode, code, message } = error as {
    responseCode?: unknown;
    code?: unknown;
    message?: unknown;
  };
  const says = `The mail service: ${typeof message === 'string' ? message : 'no reason given'}`;
  const name = typeof code === 'string' ? code : 'no-code';
  if (typeof responseCode !== 'number') return new DeliveryFailure('later', name, says);
  // Our own account is not let in: nothing is wrong with this address.
  const isOwnFault = name === 'EAUTH' || responseCode === 530 || responseCode === 535;
  return new DeliveryFailure(
    responseCode >= 500 && !isOwnFault ? 'refused' : 'later',
    String(responseCode),
    says,
  );
}
