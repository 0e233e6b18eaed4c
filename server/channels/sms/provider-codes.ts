/** What a code of the text service means for the message that met it. */
export interface ProviderCode {
  /**
   * 'refused': never for this number or these words; 'later': another attempt may arrive; 'own': the account or the sender
   * of the clinic is in the way, nothing is wrong with this number.
   */
  readonly kind: 'refused' | 'later' | 'own';
  readonly says: string;
}

/** https://www.twilio.com/docs/api/errors: the codes that a text to a family can meet. */
const codes: Readonly<Record<string, ProviderCode>> = {
  '20003': { kind: 'own', says: 'The text service does not let the clinic’s account in.' },
  '20429': { kind: 'later', says: 'The text service is busy.' },
  '21211': { kind: 'refused', says: 'This telephone number does not exist.' },
  '21408': { kind: 'own', says: 'The clinic’s account may not send texts to this country.' },
  '21610': { kind: 'refused', says: 'This number has switched texts off.' },
  '21612': { kind: 'refused', says: 'This number cannot be reached by text.' },
  '21614': { kind: 'refused', says: 'This is no mobile number.' },
  '21617': { kind: 'refused', says: 'The text is too long.' },
  '30001': { kind: 'later', says: 'The text service had too much to send.' },
  '30002': { kind: 'own', says: 'The clinic’s account at the text service is suspended.' },
  '30003': { kind: 'later', says: 'The telephone was off or out of reach.' },
  '30004': { kind: 'refused', says: 'The telephone or its network blocks texts.' },
  '30005': { kind: 'refused', says: 'This number is unknown or no longer in use.' },
  '30006': { kind: 'refused', says: 'This is a landline, or its network takes no texts.' },
  '30007': { kind: 'refused', says: 'The telephone network filtered the text out.' },
  '30008': { kind: 'later', says: 'The telephone network lost the text and gives no reason.' },
  '30034': { kind: 'own', says: 'The clinic’s sender number is not registered for texts.' },
};

export const providerCode = (code: string): ProviderCode | null => codes[code] ?? null;
