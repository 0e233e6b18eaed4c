import { createServer } from 'node:net';

/** True when a program could listen there now. */
export function portIsFree(port, host = '127.0.0.1') {
  return new Promise((settle) => {
    const probe = createServer();
    probe.once('error', () => settle(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => settle(true)));
  });
}

/** A port that is free at this moment; another program may still take it first. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}
