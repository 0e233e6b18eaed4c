// One fast MariaDB in memory for a whole test run; its keys travel to the workers by environment.
import { randomBytes } from 'node:crypto';
import { accountNames, accountStatements } from '../../server/database/local-server/accounts.mjs';
import { startThrowawayServer } from '../../server/database/local-server/local-server.mjs';
import { owner } from '../../server/database/local-server/options.mjs';
import { runAsRoot } from '../../server/database/local-server/root-client.mjs';

export async function startTestDatabaseServer() {
  const server = await startThrowawayServer();
  const passwords = {
    app: randomBytes(12).toString('hex'),
    migrate: randomBytes(12).toString('hex'),
  };
  await runAsRoot(server, accountStatements(passwords));
  const environment = {
    THREEDAWN_TEST_DATABASE_SOCKET: server.socket,
    THREEDAWN_TEST_DATABASE_ROOT_USER: owner(),
    THREEDAWN_TEST_DATABASE_PORT: String(server.port),
    THREEDAWN_TEST_DATABASE_APP_USER: accountNames.app,
    THREEDAWN_TEST_DATABASE_APP_PASSWORD: passwords.app,
    THREEDAWN_TEST_DATABASE_MIGRATE_USER: accountNames.migrate,
    THREEDAWN_TEST_DATABASE_MIGRATE_PASSWORD: passwords.migrate,
  };
  return { ...server, environment };
}
