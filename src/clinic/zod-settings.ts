/**
 * Loaded with the polyfills, before everything else, because schemas look at it when they are made: the page's policy forbids code made
 * from text, which zod would otherwise try for speed and the browser report as a violation.
 */
(globalThis as { __zod_globalConfig?: { jitless: boolean } }).__zod_globalConfig = {
  jitless: true,
};
