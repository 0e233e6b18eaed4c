// Furnishes a clinic as the demo clinic is, with signed words, protocol and laboratory, but without
// any family: the families of a run come by themselves, by the same doors as everybody.
import { createRequire } from 'node:module';
import { inRoot } from '../../server/bootstrap/folders.mjs';

const require = createRequire(import.meta.url);
const built = (path) => require(inRoot('build', path));

async function furnish() {
  const { readSettings } = built('server/config/settings.js');
  const { openContext } = built('server/open-context.js');
  const { inTransaction } = built('server/database/connection.js');
  const { seedDemoClinic } = built('server/database/seeds/demo-clinic.js');
  const { seedWording } = built('server/wording/seed-wording.js');
  const { builtLanguages } = built('shared/languages/languages.js');
  const context = await openContext(readSettings(process.env), 'furnish');
  const { db, clock } = context;
  const now = clock.now();
  try {
    await inTransaction(db, async (transaction) => {
      const clinic = await seedDemoClinic(db, transaction, now);
      const signedBy = { staffId: clinic.staffIds.get('okafor'), at: now };
      for (const { id: language } of builtLanguages)
        await seedWording(db, { language, signedBy, now }, transaction);
    });
  } finally {
    await context.close();
  }
}

await furnish();
