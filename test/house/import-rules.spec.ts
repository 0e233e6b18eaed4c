import { join } from 'node:path';
import { ESLint } from 'eslint';
import tseslint from 'typescript-eslint';

// The configuration is handed over as it is, because Jest cannot load it by import().
// eslint-disable-next-line @typescript-eslint/no-require-imports
const configuration = require('../../eslint.config.js');
const root = join(__dirname, '..', '..');

const eslint = new ESLint({
  cwd: root,
  overrideConfigFile: true,
  // The samples lie in no project, so the rules that need types are left out.
  overrideConfig: [
    ...configuration,
    { ...tseslint.configs.disableTypeChecked, files: ['**/*.ts'] },
    { files: ['**/*.ts'], languageOptions: { parserOptions: { project: null } } },
  ],
});

/** What the lint says about a text that pretends to be a file of the checkout. */
async function complaints(filePath: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath: join(root, filePath) });
  return (result?.messages ?? [])
    .filter(({ ruleId, fatal }) => fatal || !ruleId?.includes('no-unused-vars'))
    .map(({ ruleId, message }) => `${ruleId ?? 'fatal'}: ${message}`);
}

const value = (source: string): string => `import { x } from '${source}';\nexport const y = [x];\n`;
const type = (source: string): string =>
  `import type { X } from '${source}';\nexport type Y = X[];\n`;

const refused: [file: string, text: string, why: string][] = [
  ['shared/domain/sample.ts', value('node:fs'), 'no Node.js in shared'],
  ['shared/domain/sample.ts', value('@angular/core'), 'no Angular in shared'],
  ['shared/domain/sample.ts', value('express'), 'no Express in shared'],
  ['shared/domain/sample.ts', value('sequelize'), 'no Sequelize in shared'],
  ['shared/domain/sample.ts', value('zod'), 'zod for contracts only'],
  ['shared/contracts/sample.ts', value('luxon'), 'luxon for the edge of the domain only'],
  ['shared/domain/sample.ts', value('luxon'), 'luxon for the edge of the domain only'],
  ['shared/access/sample.ts', value('../../server/auth/roles'), 'shared knows no server'],
  [
    'src/family/app/letters/sample.ts',
    value('../../../clinic/app/app'),
    'not the other application',
  ],
  [
    'src/clinic/app/letters/sample.ts',
    value('../../../family/app/app'),
    'not the other application',
  ],
  ['src/clinic/app/letters/sample.ts', value('../results/results'), 'not another screen'],
  ['src/family/app/letters/sample.ts', value('../arrive/arrive'), 'not another screen'],
  [
    'src/family/app/sample.ts',
    value('../../../shared/contracts/letters'),
    'types of contracts only',
  ],
  ['src/family/app/sample.ts', value('../../../shared/domain/zone'), 'no zones on the phone'],
  ['src/family/app/sample.ts', value('zod'), 'no zod on the phone'],
  ['src/family/app/sample.ts', value('luxon'), 'no luxon on the phone'],
  ['src/family/app/sample.ts', value('@angular/cdk/overlay'), 'no overlays on the phone'],
  ['src/family/app/sample.ts', value('@angular/material/dialog'), 'no overlays on the phone'],
  ['src/family/app/letters/sample.ts', value('@angular/common/http'), 'HTTP in the clients only'],
  ['src/clinic/app/letters/sample.ts', value('@angular/common/http'), 'HTTP in the clients only'],
  ['src/clinic/app/letters/sample.ts', value('../../../../server/letters/letters'), 'no server'],
  ['src/common/api/sample.ts', value('../ui/suns'), 'no pieces of pages in clients'],
  ['src/common/api/sample.ts', value('../session/current-user'), 'no session in clients'],
  ['src/common/api/sample.ts', value('../../clinic/app/app'), 'no screens in clients'],
  ['src/common/ui/sample.ts', value('../api/letters-client'), 'no clients in pieces of pages'],
  ['src/common/ui/sample.ts', value('../session/current-user'), 'no session in pieces of pages'],
  ['src/common/ui/sample.ts', value('../../family/app/arrive/arrive'), 'no screens'],
  ['server/letters/sample.ts', value('../results/results-routes'), 'not another matter’s routes'],
  ['server/letters/sample.ts', value('../results/result-model'), 'not another matter’s model'],
  ['server/letters/sample.ts', value('../channels/sms/send'), 'not a channel'],
  ['server/letters/sample.ts', value('../stand-ins/phones'), 'not a stand-in'],
  ['server/letters/sample.ts', value('../outbox/claim'), 'of the outbox enqueue only'],
  ['server/letters/sample.ts', value('../context'), 'not the wiring'],
  ['server/letters/sample.ts', value('../app'), 'not the wiring'],
  ['server/letters/sample.ts', value('twilio'), 'not the texting library'],
  ['server/database/sample.ts', value('../letters/letters-routes'), 'no routes in the database'],
  ['server/database/sample.ts', value('../letters/letters'), 'no use-cases in the database'],
  ['server/webhooks/sample.ts', value('../messages/message-model'), 'no models in webhooks'],
  ['server/outbox/sample.ts', value('../letters/letters'), 'no matters in the outbox'],
  ['server/channels/sms/sample.ts', value('../../database/connection'), 'no database in channels'],
  ['server/channels/sms/sample.ts', value('../../letters/letters'), 'no matters in channels'],
  ['server/letters/sample.ts', value('../../test/support/database'), 'nothing imports test'],
  ['shared/domain/sample.ts', value('../../test/support/database'), 'nothing imports test'],
  ['src/common/ui/sample.ts', value('../../../test/support/pages'), 'nothing imports test'],
  ['server/letters/sample.ts', "export * from '../results/result-model';\n", 'export from counts'],
  ['server/letters/sample.ts', "void import('../channels/sms/send');\n", 'import() counts'],
];

const allowed: [file: string, text: string, why: string][] = [
  ['shared/contracts/sample.ts', value('zod'), 'zod in contracts'],
  ['shared/domain/zone.ts', value('luxon'), 'luxon at the edge'],
  ['shared/domain/sample.ts', value('./day'), 'shared imports itself'],
  ['src/family/app/sample.ts', type('../../../shared/contracts/letters'), 'types of contracts'],
  ['src/family/app/sample.ts', value('../../../shared/domain/day'), 'zone-free domain'],
  ['src/family/app/sample.ts', value('@angular/material/button'), 'a button'],
  ['src/family/app/letters/sample.ts', value('../../../common/ui/suns'), 'pieces of pages'],
  ['src/family/app/app.config.ts', value('@angular/common/http'), 'HTTP is provided there'],
  ['src/clinic/app/app.routes.ts', value('./letters/letters'), 'the application knows its screens'],
  ['src/clinic/app/letters/sample.ts', value('./letter-sheet'), 'own files'],
  ['src/common/api/sample.ts', value('@angular/common/http'), 'clients speak HTTP'],
  ['src/common/api/sample.ts', value('../../../shared/contracts/letters'), 'clients parse'],
  ['server/letters/sample.ts', value('../outbox/enqueue'), 'enqueue'],
  ['server/letters/sample.ts', value('../access-record/record'), 'record'],
  ['server/letters/sample.ts', value('../results/results'), 'another matter’s use-cases'],
  ['server/letters/sample.ts', value('./letter-model'), 'own model'],
  ['server/letters/sample.ts', value('../database/connection'), 'the connection'],
  ['server/letters/sample.ts', type('../context'), 'the type of the context'],
  ['server/database/models.ts', value('../letters/letter-model'), 'the list of models'],
  ['server/webhooks/sample.ts', value('../messages/messages'), 'use-cases'],
  ['server/outbox/sample.ts', value('../channels/sms/send'), 'ways out'],
  ['server/app.ts', value('./letters/letters-routes'), 'the wiring knows all'],
  ['server/letters/letters.spec.ts', value('../../test/support/database'), 'tests import all'],
];

describe('who may import whom', () => {
  it.each(refused)('%s is refused: %s (%s)', async (file, text) => {
    expect(await complaints(file, text)).toContainEqual(expect.stringMatching(/^house\/imports: /));
  });

  it.each(allowed)('%s is allowed: %s (%s)', async (file, text) => {
    expect(await complaints(file, text)).toEqual([]);
  });
});

describe('the domain has no clock of its own', () => {
  it.each(['Date.now()', 'new Date()', 'DateTime.now()', 'Math.random()'])(
    'refuses %s',
    async (call) => {
      expect(
        await complaints('shared/domain/sample.ts', `export const t = (): unknown => ${call};\n`),
      ).toContainEqual(expect.stringMatching(/^no-restricted-syntax: /));
    },
  );

  it('allows an instant that is handed in', async () => {
    expect(
      await complaints(
        'shared/domain/sample.ts',
        'export const t = (now: number): Date => new Date(now);\n',
      ),
    ).toEqual([]);
  });
});

describe('only the typed clients speak to the server', () => {
  it.each(['fetch', 'EventSource', 'XMLHttpRequest'])('refuses %s in a screen', async (name) => {
    expect(
      await complaints('src/clinic/app/letters/sample.ts', `export const speak = ${name};\n`),
    ).toContainEqual(expect.stringMatching(/^no-restricted-globals: /));
  });
});
