let visitors = 0;

/**
 * Headers by which a visitor of the house has a network address of its own (RFC 5737, for documentation), as through
 * one proxy. All tests of a run share a house, and its limits count by address.
 */
export function ownAddress(): { readonly 'X-Forwarded-For': string } {
  visitors += 1;
  return { 'X-Forwarded-For': `198.51.100.${(visitors % 250) + 1}` };
}
