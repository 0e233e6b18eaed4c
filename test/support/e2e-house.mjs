// Opens one whole house for all browser tests and closes it after the last.
import { owner } from '../../server/database/local-server/options.mjs';
import { buildAll } from '../../server/bootstrap/build.mjs';
import { openThrowawayHouse } from '../../server/bootstrap/house.mjs';

export default async function globalSetup() {
  await buildAll();
  // Visitors of the tests come from addresses of their own, see e2e/support/own-address.
  const house = await openThrowawayHouse({ environment: { THREEDAWN_TRUSTED_PROXIES: '1' } });
  const { environment, database, origin } = house;
  const app = new URL(environment.THREEDAWN_DATABASE_URL);
  const migrate = new URL(environment.THREEDAWN_DATABASE_MIGRATE_URL);
  Object.assign(process.env, {
    THREEDAWN_ORIGIN: origin,
    THREEDAWN_DATA_DIR: house.dataDirectory,
    THREEDAWN_SMS_STAND_IN_URL: environment.THREEDAWN_SMS_STAND_IN_URL,
    THREEDAWN_STAND_IN_CONTROL_PORT: environment.THREEDAWN_STAND_IN_CONTROL_PORT,
    THREEDAWN_TEST_DATABASE_SOCKET: database.socket,
    THREEDAWN_TEST_DATABASE_ROOT_USER: owner(),
    THREEDAWN_TEST_DATABASE_PORT: String(database.port),
    THREEDAWN_TEST_DATABASE_APP_USER: app.username,
    THREEDAWN_TEST_DATABASE_APP_PASSWORD: app.password,
    THREEDAWN_TEST_DATABASE_MIGRATE_USER: migrate.username,
    THREEDAWN_TEST_DATABASE_MIGRATE_PASSWORD: migrate.password,
  });
  return () => house.close();
}
