export default async function globalTeardown() {
  await globalThis.testDatabaseServer?.stop();
}
