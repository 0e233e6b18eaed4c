/** A failure the caller can act on. One handler turns it into RFC 9457 problem JSON. */
export class Problem extends Error {
  constructor(
    readonly status: number,
    /** Stable, kebab-case; screens and tests rely on it. */
    readonly code: string,
    /** A complete sentence for a person. */
    readonly title: string,
    readonly more: {
      readonly detail?: string;
      readonly errors?: readonly FieldError[];
      readonly [extra: string]: unknown;
    } = {},
  ) {
    super(title);
    this.name = 'Problem';
  }
}

export interface FieldError {
  /** Dotted path into the request, for example 'children.0.bornOn'. */
  readonly path: string;
  readonly message: string;
}

export const notFound = (what = 'This'): Problem =>
  new Problem(404, 'not-found', `${what} does not exist, or you may not see it.`);

export const invalid = (errors: readonly FieldError[], title = 'Some answers need another look.') =>
  new Problem(422, 'invalid', title, { errors });

export const changedMeanwhile = (): Problem =>
  new Problem(
    409,
    'changed-meanwhile',
    'Somebody changed this in the meantime. Look at the new version and try again.',
  );
