import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { clinicLanguages } from '../../shared/languages/clinic-languages';
import { builtLanguages } from '../../shared/languages/languages';

export type Application = 'family' | 'clinic';

const lookAgainMs = 5_000;

/**
 * The languages in which an application can be served: those of the list that were built. Looked up anew every few
 * seconds, so that a build beside a running server is found.
 */
export function builtApplications(
  distDir: string,
  application: Application,
): () => readonly string[] {
  const offered: readonly string[] =
    application === 'clinic' ? clinicLanguages : builtLanguages.map(({ id }) => id);
  let lookedAt = -Infinity;
  let found: readonly string[] = [];
  return () => {
    if (performance.now() - lookedAt > lookAgainMs) {
      lookedAt = performance.now();
      found = offered.filter((id) => existsSync(join(distDir, application, id, 'index.html')));
    }
    return found;
  };
}
