// Who may import whom, as one table. A row names the files it is about and answers, for one import, the
// reason why it is not allowed, or undefined.
//
// An import is `{ path, package, typeOnly }`: `path` from the checkout without extension for a relative
// import, `package` as written otherwise.

const serverInfrastructure = new Set([
  'access-record',
  'auth',
  'bootstrap',
  'channels',
  'clock',
  'config',
  'database',
  'http',
  'live',
  'outbox',
  'printing',
  'stand-ins',
  'webhooks',
]);

const inFolder = (folder) => (file) => file.startsWith(`${folder}/`);
const segment = (path, index) => path?.split('/')[index] ?? '';
const folderOf = (path) =>
  path?.startsWith('server/') && path.split('/').length > 2 ? segment(path, 1) : '';
const isMatter = (folder) => folder !== '' && !serverInfrastructure.has(folder);
const matterOf = (path) => (isMatter(folderOf(path)) ? folderOf(path) : '');

/** Of the outbox a matter may use: queueing, building the calendar file that is queued, and how it goes. */
const openOfOutbox = new Set(
  ['enqueue', 'calendar-file', 'health'].map((name) => `server/outbox/${name}`),
);
const isRoutes = (path) => /-routes$/.test(path ?? '');
const isModel = (path) => /-model$/.test(path ?? '');
const isWiring = (path) => /^server\/(context|main|worker|app)$/.test(path ?? '');
const isScreen = (path) => /^src\/(family|clinic)\/app\/[^/]+\//.test(path ?? '');
const screenOf = (path) => (isScreen(path) ? path.split('/').slice(0, 4).join('/') : '');
const isNodeModule = (name) =>
  name !== undefined &&
  (name.startsWith('node:') || require('node:module').builtinModules.includes(name));

// Overlays and what is built on them cost the family's phone some 40 kB.
const heavyForFamilies =
  /^(zod|luxon|@angular\/material-luxon-adapter|@angular\/cdk\/(overlay|dialog|menu|portal)|@angular\/material\/(?!button$|core$|progress-bar$)[^/]+)(\/|$)/;

const rows = [
  {
    about: () => true,
    refuse: ({ path }) => path?.startsWith('test/') && 'nothing but tests imports test/',
  },
  {
    about: inFolder('shared'),
    refuse: ({ path, package: name }, file) => {
      if (path !== undefined)
        return !path.startsWith('shared/') && 'shared imports nothing but itself';
      if (name === 'zod')
        return !file.startsWith('shared/contracts/') && 'zod belongs to shared/contracts';
      if (name === 'luxon')
        return (
          file !== 'shared/domain/zone.ts' &&
          'luxon belongs to the edge of the domain, shared/domain/zone'
        );
      return 'shared is pure: no other packages';
    },
  },
  {
    about: inFolder('src'),
    refuse: ({ path, package: name }) =>
      (path?.startsWith('server/') && 'the applications do not import the server') ||
      (isNodeModule(name) && 'a browser has no Node.js modules'),
  },
  {
    about: inFolder('src/family'),
    refuse: ({ path, package: name, typeOnly }) =>
      (path?.startsWith('src/clinic/') && 'the two applications do not import each other') ||
      (path?.startsWith('shared/contracts/') &&
        !typeOnly &&
        'at run time the family application has no contracts: import type') ||
      (path === 'shared/domain/zone' &&
        !typeOnly &&
        'the phone converts no zones: the server sends instants with ready wording') ||
      (heavyForFamilies.test(name ?? '') && !typeOnly && 'too heavy for a family’s phone'),
  },
  {
    about: inFolder('src/clinic'),
    refuse: ({ path }) =>
      path?.startsWith('src/family/') && 'the two applications do not import each other',
  },
  {
    about: (file) => isScreen(file),
    refuse: ({ path }, file) =>
      screenOf(path) !== '' &&
      screenOf(path) !== screenOf(file) &&
      'a screen does not import another screen’s files',
  },
  {
    about: inFolder('src/common'),
    refuse: ({ path }) =>
      /^src\/(family|clinic)\//.test(path ?? '') && 'what is common knows no application',
  },
  {
    about: inFolder('src/common/api'),
    refuse: ({ path }) =>
      /^src\/common\/(ui|session)\//.test(path ?? '') && 'the clients know HTTP and contracts only',
  },
  {
    about: (file) => /^src\/common\/api\/family/.test(file),
    refuse: ({ path, package: name, typeOnly }) =>
      (path?.startsWith('shared/contracts/') &&
        !typeOnly &&
        'at run time the family application has no contracts: import type') ||
      (heavyForFamilies.test(name ?? '') && !typeOnly && 'too heavy for a family’s phone'),
  },
  {
    about: inFolder('src/common/ui'),
    refuse: ({ path, package: name }) =>
      (/^src\/common\/(api|session)\//.test(path ?? '') &&
        'pieces of a page are handed what they show') ||
      (name?.startsWith('@angular/common/http') && 'only src/common/api speaks HTTP'),
  },
  {
    about: (file) => /^src\/(family|clinic)\//.test(file) && !file.endsWith('/app.config.ts'),
    refuse: ({ package: name }) =>
      name?.startsWith('@angular/common/http') && 'only src/common/api speaks HTTP',
  },
  {
    about: inFolder('server'),
    refuse: ({ path, typeOnly }, file) =>
      (path?.startsWith('src/') && 'the server does not import the applications') ||
      (isWiring(path) &&
        !isWiring(file.replace(/\.ts$/, '')) &&
        !typeOnly &&
        'the wiring is imported by itself alone; take the type of the context'),
  },
  {
    about: (file) => matterOf(file) !== '',
    refuse: ({ path, typeOnly }, file) => {
      const folder = folderOf(path);
      if (folder === '' || folder === folderOf(file)) return undefined;
      if (isRoutes(path)) return 'a matter does not import another matter’s routes';
      if (isModel(path)) return 'a matter does not import another matter’s model';
      if (folder === 'channels')
        return 'messages go through the outbox, never straight to a channel';
      if (folder === 'stand-ins') return 'the product does not know the stand-ins';
      if (folder === 'webhooks') return 'a matter does not import the webhooks';
      if (folder === 'outbox' && !openOfOutbox.has(path) && !typeOnly)
        return 'a matter enqueues; everything else in the outbox is the sender’s';
      if (/^server\/database\/(models|migrat|seed|local-server)/.test(path) && !typeOnly)
        return 'a matter takes the connection; the list of models and the migrations are not its concern';
      return undefined;
    },
  },
  {
    about: inFolder('server/database'),
    refuse: ({ path }, file) => {
      const folder = matterOf(path);
      if (isRoutes(path)) return 'the database knows no routes';
      // The demo clinic is furnished as a person would: by the use-cases.
      if (folder === '' || isModel(path) || /^server\/database\/seeds?[/.]/.test(file))
        return undefined;
      return 'the database knows the models, not the use-cases';
    },
  },
  {
    about: inFolder('server/webhooks'),
    refuse: ({ path }) =>
      (isModel(path) && 'a webhook calls use-cases, never models') ||
      (isRoutes(path) && 'a webhook calls use-cases, never other routes'),
  },
  {
    about: inFolder('server/outbox'),
    refuse: ({ path }) =>
      (matterOf(path) !== '' && 'the outbox knows no matters') ||
      (/^server\/(stand-ins|webhooks|auth|http)\//.test(path ?? '') &&
        'the outbox knows channels and the database'),
  },
  {
    about: inFolder('server/channels'),
    refuse: ({ path }) =>
      path?.startsWith('server/') &&
      !/^server\/(channels|config)\//.test(path) &&
      'a channel knows settings and contracts only',
  },
  {
    about: (file) =>
      file.startsWith('server/') && !/^server\/(stand-ins|worker\.ts|channels|outbox)/.test(file),
    refuse: ({ package: name, typeOnly }) =>
      name === 'twilio' &&
      !typeOnly &&
      'the texting service’s library is loaded by the sender alone',
  },
  {
    about: (file) =>
      file.startsWith('server/') &&
      folderOf(file) !== 'stand-ins' &&
      !isWiring(file.replace(/\.ts$/, '')),
    refuse: ({ path }) =>
      folderOf(path) === 'stand-ins' && 'the product does not know the stand-ins',
  },
  {
    about: (file) => /^server\/(http|auth|clock|live|access-record|config|printing)\//.test(file),
    refuse: ({ path }) =>
      isRoutes(path) && folderOf(path) !== 'auth' && 'foundations know no matter’s routes',
  },
];

/** Tests may import everything, also those that lie beside what they test. */
const isTest = (file) => file.startsWith('test/') || file.endsWith('.spec.ts');

/** The reasons why this import of this file is not allowed; none when it is. */
function refusals(file, imported) {
  if (isTest(file)) return [];
  return rows
    .filter(({ about }) => about(file))
    .map(({ refuse }) => refuse(imported, file))
    .filter(Boolean);
}

module.exports = { refusals };
