/** Callback libraries may hand over anything; a promise is rejected with an error. */
export const asError = (error: unknown): Error =>
  error instanceof Error ? error : new Error(String(error));
