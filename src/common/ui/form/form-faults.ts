import type { AbstractControl, FormGroup } from '@angular/forms';
import { schemaSentence } from './schema-sentences';

/**
 * Puts each sentence beside its field, by dotted path ('familyMembers.0.phone').
 * @returns the sentences that belong to no field of this form, for the summary.
 */
export function showFaults(form: FormGroup, faults: ReadonlyMap<string, string>): string[] {
  form.markAllAsTouched();
  const rest: string[] = [];
  for (const [path, says] of faults) {
    const control = path === '' ? null : form.get(path);
    if (control) control.setErrors({ says });
    else rest.push(says);
  }
  return rest;
}

/** The sentence beside a field; empty when there is none. */
export function faultOf(control: AbstractControl | null): string {
  const says: unknown = control?.errors?.['says'];
  return typeof says === 'string' ? says : '';
}

interface Issue {
  readonly path: readonly PropertyKey[];
  readonly message: string;
}

/** Sentences of a schema that refused a form. */
export const issuesByPath = (issues: readonly Issue[]): Map<string, string> =>
  new Map(issues.map((issue) => [issue.path.map(String).join('.'), schemaSentence(issue.message)]));
