import type { ProblemDocument } from '../../../../shared/contracts/problem';

export type FailureKind =
  /** Nobody answered: no signal, or the way to the clinic is interrupted. */
  | 'unreached'
  /** Nobody is signed in (any more). */
  | 'signed-out'
  /** Asked too often. */
  | 'too-often'
  /** A definite answer that says no. */
  | 'refused'
  /** The clinic's side failed; the same request may succeed later. */
  | 'broken';

/** What went wrong, in the terms a screen can act on. */
export class FamilyFailure extends Error {
  constructor(
    readonly kind: FailureKind,
    readonly problem: ProblemDocument | null,
  ) {
    super(problem?.title ?? kind);
  }

  get code(): string {
    return this.problem?.code ?? '';
  }

  /** True when sending the same thing once more can end differently. */
  get mayPass(): boolean {
    return this.kind !== 'refused';
  }

  /** A number the server sent beside the problem, such as the tries left. */
  number(name: string): number | null {
    const value = this.problem?.[name];
    return typeof value === 'number' ? value : null;
  }
}

/**
 * 502 to 504 come from what stands between the phone and the clinic (a service worker answers 504
 * when it is offline), so they say nothing about whether the clinic got the request.
 */
function kindOf(status: number): FailureKind {
  if (status === 502 || status === 503 || status === 504) return 'unreached';
  if (status === 401) return 'signed-out';
  if (status === 429) return 'too-often';
  return status >= 400 && status < 500 && status !== 408 ? 'refused' : 'broken';
}

function problemOf(body: unknown): ProblemDocument | null {
  return typeof body === 'object' && body !== null && 'code' in body && 'title' in body
    ? (body as ProblemDocument)
    : null;
}

/** @param body the answer's JSON, if it had any */
export function failureOf(status: number, body: unknown): FamilyFailure {
  return new FamilyFailure(kindOf(status), problemOf(body));
}

export function familyFailure(error: unknown): FamilyFailure {
  return error instanceof FamilyFailure ? error : new FamilyFailure('broken', null);
}
