import type { RequestHandler } from 'express';
import {
  getSignatureAlgorithm,
  SIGNATURE_HEADER,
  SIGNATURE_SETTINGS_HEADER,
  validateRequest,
} from 'twilio/lib/webhooks/webhooks';
import type { Settings } from '../config/settings';
import { Problem } from '../http/problem';

/**
 * Lets only the text service pass. Its signature covers the public address and the form; the address comes from the
 * settings, never from the request, whose host anybody can choose.
 */
export function fromTextService({ sms, origin }: Pick<Settings, 'sms' | 'origin'>): RequestHandler {
  return (req, _res, next) => {
    const signature = req.header(SIGNATURE_HEADER);
    const isGenuine =
      signature !== undefined &&
      validateRequest(
        sms.authToken,
        signature,
        `${origin}${req.originalUrl}`,
        (req.body ?? {}) as Record<string, unknown>,
        getSignatureAlgorithm(req.header(SIGNATURE_SETTINGS_HEADER)),
      );
    if (!isGenuine)
      throw new Problem(403, 'not-from-the-text-service', 'Only the text service may report here.');
    next();
  };
}
