import { startTestDatabaseServer } from './database-server.mjs';

export default async function globalSetup() {
  const server = await startTestDatabaseServer();
  Object.assign(process.env, server.environment);
  globalThis.testDatabaseServer = server;
}
