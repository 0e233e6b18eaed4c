// What a browser must fetch before the first page of each application, in the brotli form that is served.
import { existsSync, readFileSync, statSync } from 'node:fs';
import { inRoot } from '../../server/bootstrap/folders.mjs';
import { say } from '../../server/bootstrap/say.mjs';

// Measured on the bare frame of each application, with room for its screens.
const limits = [
  { application: 'family', scriptBytes: 95_000, styleBytes: 8_000 },
  { application: 'clinic', scriptBytes: 150_000, styleBytes: 14_000 },
];

export function servedSizes() {
  const counts = { passed: 0, failed: 0 };
  for (const { application, scriptBytes, styleBytes } of limits) {
    const folder = inRoot('dist', application, 'en');
    const page = readFileSync(`${folder}/index.html`, 'utf8');
    const named = [...page.matchAll(/(?:src|href)="([^"]+\.(?:js|css))"/g)].map(([, name]) => name);
    for (const [kind, limit] of [
      ['js', scriptBytes],
      ['css', styleBytes],
    ]) {
      const files = [...new Set(named.filter((name) => name.endsWith(`.${kind}`)))];
      const uncompressed = files.filter((name) => !existsSync(`${folder}/${name}.br`));
      const bytes = files
        .filter((name) => !uncompressed.includes(name))
        .reduce((sum, name) => sum + statSync(`${folder}/${name}.br`).size, 0);
      const fits = files.length > 0 && uncompressed.length === 0 && bytes <= limit;
      say(
        `  ${application}: ${(bytes / 1000).toFixed(1)} kB of ${kind} in ${files.length} files, at most ${limit / 1000} kB${fits ? '' : ' (too much, or not compressed)'}`,
      );
      counts[fits ? 'passed' : 'failed'] += 1;
    }
  }
  return counts;
}
