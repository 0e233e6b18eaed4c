import { createServer } from 'node:http';
import { existsSync, readFileSync } from 'node:fs';
import { extname, join } from 'node:path';

const types = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
};

/** Serves one folder on loopback, brotli where it is there; answers `{ origin, close }`. */
export async function serveFolder(folder) {
  const server = createServer((request, response) => {
    const { pathname } = new URL(request.url ?? '/', 'http://localhost');
    const name = pathname === '/' ? 'index.html' : pathname.slice(1);
    const file = join(folder, name);
    if (!file.startsWith(folder) || !existsSync(file)) {
      response.writeHead(404).end();
      return;
    }
    const compressed = existsSync(`${file}.br`);
    response.writeHead(200, {
      'Content-Type': types[extname(name)] ?? 'application/octet-stream',
      'Cache-Control': 'no-cache',
      ...(compressed ? { 'Content-Encoding': 'br' } : {}),
    });
    response.end(readFileSync(compressed ? `${file}.br` : file));
  });
  await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    origin: `http://localhost:${server.address().port}`,
    close: () =>
      new Promise((resolve) => {
        server.close(resolve);
        server.closeAllConnections();
      }),
  };
}
