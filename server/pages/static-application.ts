import { stat } from 'node:fs/promises';
import { extname, resolve, sep } from 'node:path';
import type { Request, RequestHandler, Response } from 'express';
import type { Application } from './built-applications';

/** Names that the build puts a hash into: their content never changes. */
const hashedName = /-[A-Za-z0-9_-]{8}\.(js|css|woff2?|svg|png)$/;
const year = 31_536_000;

const encodings = [
  { name: 'br', ending: '.br' },
  { name: 'gzip', ending: '.gz' },
] as const;

const isFile = (path: string): Promise<boolean> =>
  stat(path).then(
    (found) => found.isFile(),
    () => false,
  );

/** The file's path below the root, or null when the address leaves it, is hidden or cannot be read. */
function pathWithin(root: string, address: string): string | null {
  let decoded: string;
  try {
    decoded = decodeURIComponent(address);
  } catch {
    return null;
  }
  if (decoded.includes('\0') || decoded.split(/[\\/]/).some((part) => part.startsWith('.')))
    return null;
  const path = resolve(root, `.${sep}${decoded}`);
  return path === root || path.startsWith(`${root}${sep}`) ? path : null;
}

/**
 * Files of one application in one language, as the build left them: the compressed one that the browser takes, for ever
 * when its name carries a hash, asked again each time otherwise. Addresses without an ending are screens of the
 * application and get its index.html.
 */
export function staticApplication(
  distDir: string,
  application: Application,
  language: string,
): RequestHandler {
  const root = resolve(distDir, application, language);
  return async (req, res, next) => {
    if (req.method !== 'GET' && req.method !== 'HEAD') {
      next();
      return;
    }
    // "/en" without the slash would resolve the page's relative addresses one folder too high.
    if (req.path === '/' && !req.originalUrl.split('?')[0]?.endsWith('/')) {
      res.redirect(302, `${req.baseUrl}/`);
      return;
    }
    const path = pathWithin(root, req.path);
    const isScreen = extname(req.path) === '';
    if (path !== null && !isScreen && (await isFile(path))) await sendFile(req, res, root, path);
    else if (path !== null && isScreen) await sendFile(req, res, root, resolve(root, 'index.html'));
    else next();
  };
}

async function sendFile(req: Request, res: Response, root: string, path: string): Promise<void> {
  const accepted = encodings.filter(({ name }) => req.acceptsEncodings(name) === name);
  let chosen: { path: string; encoding?: string } = { path };
  for (const { name, ending } of accepted)
    if (await isFile(path + ending)) {
      chosen = { path: path + ending, encoding: name };
      break;
    }
  res.type(extname(path)).set({
    Vary: 'Accept-Encoding',
    'Cache-Control': hashedName.test(path) ? `public, max-age=${year}, immutable` : 'no-cache',
  });
  if (chosen.encoding) res.set('Content-Encoding', chosen.encoding);
  await new Promise<void>((done, fail) => {
    res.sendFile(
      chosen.path.slice(root.length + 1),
      { root, cacheControl: false },
      // Who left the page while it loaded needs no answer any more.
      (error?: Error & { readonly code?: string }) =>
        error && error.code !== 'ECONNABORTED' && !res.headersSent ? fail(error) : done(),
    );
  });
}
