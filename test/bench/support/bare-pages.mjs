// Two Angular pages with nothing on them that is ours: what a page of this framework costs at least.
import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { inRoot } from '../../../server/bootstrap/folders.mjs';
import { precompress } from '../../../server/bootstrap/precompress.mjs';
import { runNode } from '../../../server/bootstrap/run-program.mjs';
import { buildStamp } from '../../../server/bootstrap/stale.mjs';

const workspace = inRoot('build', 'bench');
/** The name of each bare page is the name of its folder. */
export const barePages = ['bare', 'bare-with-router'];

const index = `<!doctype html>
<html lang="en">
  <head>
    <meta charset="utf-8" />
    <title>Bare</title>
    <base href="/" />
    <meta name="viewport" content="width=device-width, initial-scale=1" />
    <link rel="icon" href="data:," />
  </head>
  <body><bare-page></bare-page></body>
</html>
`;

const component = (
  imports,
  body,
) => `import { ${['Component', ...imports].join(', ')} } from '@angular/core';
${body}`;

const sources = {
  bare: {
    'main.ts': component(
      ['signal'],
      `import { bootstrapApplication } from '@angular/platform-browser';

@Component({ selector: 'bare-page', template: '<h1>{{ says() }}</h1>' })
class Page {
  protected readonly says = signal('A bare page that says one sentence.');
}

void bootstrapApplication(Page);
`,
    ),
  },
  'bare-with-router': {
    'main.ts': component(
      [],
      `import { bootstrapApplication } from '@angular/platform-browser';
import { provideHttpClient, withFetch } from '@angular/common/http';
import { RouterOutlet, provideRouter } from '@angular/router';

@Component({ selector: 'bare-page', imports: [RouterOutlet], template: '<router-outlet />' })
class Page {}

const routes = [{ path: '', loadComponent: () => import('./screen').then((file) => file.Screen) }];
void bootstrapApplication(Page, {
  providers: [provideRouter(routes), provideHttpClient(withFetch())],
});
`,
    ),
    'screen.ts': component(
      ['inject', 'signal'],
      `import { HttpClient } from '@angular/common/http';

@Component({ selector: 'bare-screen', template: '<h1>{{ says() }}</h1>' })
export class Screen {
  protected readonly says = signal('');

  constructor() {
    inject(HttpClient)
      .get<{ says: string }>('says.json')
      .subscribe(({ says }) => this.says.set(says));
  }
}
`,
    ),
  },
};

const project = (name) => ({
  projectType: 'application',
  root: '',
  sourceRoot: name,
  architect: {
    build: {
      builder: '@angular/build:application',
      options: {
        browser: `${name}/main.ts`,
        index: `${name}/index.html`,
        tsConfig: `tsconfig.${name}.json`,
        outputPath: { base: `dist/${name}`, browser: '' },
        outputHashing: 'all',
        assets: [{ glob: '*.json', input: name, output: '.' }],
        optimization: {
          scripts: true,
          styles: { minify: true, inlineCritical: false },
          fonts: false,
        },
      },
    },
  },
});

function files() {
  const json = (value) => JSON.stringify(value, null, 2);
  return {
    'angular.json': json({
      version: 1,
      cli: { analytics: false, cache: { enabled: false } },
      projects: Object.fromEntries(barePages.map((name) => [name, project(name)])),
    }),
    ...Object.fromEntries(
      barePages.flatMap((name) => [
        [
          `tsconfig.${name}.json`,
          json({ extends: '../../tsconfig.json', files: [`${name}/main.ts`], include: [] }),
        ],
        [`${name}/index.html`, index],
        [`${name}/says.json`, json({ says: 'A bare page that says one sentence.' })],
        ...Object.entries(sources[name]).map(([file, text]) => [`${name}/${file}`, text]),
      ]),
    ),
  };
}

/** Builds the bare pages when Angular or their sources changed; answers their folders by name. */
export async function buildBarePages() {
  const folders = Object.fromEntries(
    barePages.map((name) => [name, join(workspace, 'dist', name)]),
  );
  const stamp = buildStamp({
    name: 'bench',
    inputs: ['package-lock.json', 'tsconfig.json', 'test/bench/support/bare-pages.mjs'],
    outputs: barePages.map((name) => `build/bench/dist/${name}/index.html`),
  });
  if (stamp.isCurrent()) return folders;
  rmSync(workspace, { recursive: true, force: true });
  for (const [file, text] of Object.entries(files())) {
    mkdirSync(dirname(join(workspace, file)), { recursive: true });
    writeFileSync(join(workspace, file), text);
  }
  for (const name of barePages)
    await runNode([inRoot('node_modules/@angular/cli/bin/ng.js'), 'build', name], {
      cwd: workspace,
      title: `The build of the page "${name}"`,
      // The same joining of chunks as for our own applications.
      env: {
        ...process.env,
        NG_CLI_ANALYTICS: 'false',
        NG_BUILD_OPTIMIZE_CHUNKS: '1',
        FORCE_COLOR: '0',
      },
    });
  await precompress(join(workspace, 'dist'));
  stamp.write();
  return folders;
}
