import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const bootstrap = join(__dirname, '..', '..', 'server', 'bootstrap');
const imports = `
  import { ManagedProcess } from '${bootstrap}/child-process.mjs';
  import { claim } from '${bootstrap}/instance-lock.mjs';
  import { checkNodeVersion } from '${bootstrap}/packages.mjs';
  import { secretsOf } from '${bootstrap}/secrets.mjs';
  import { chosenSettings, programEnvironment, withoutMigrateAccount } from '${bootstrap}/settings.mjs';
`;
const answers = 'const answer = (value) => console.log("\\n>>>" + JSON.stringify(value));';

let place: string;

beforeEach(() => {
  place = mkdtempSync(join(tmpdir(), 'threedawn-programs-'));
});

afterEach(() => rmSync(place, { recursive: true, force: true }));

/** Runs a program in a process of its own; answers what it handed to `answer`, and what was printed. */
function run(program: string): { answer: unknown; printed: string } {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--input-type=module', '-e', `${imports}\n${answers}\n${program}`],
    { encoding: 'utf8', timeout: 60_000 },
  );
  if (status !== 0) throw new Error(stderr);
  const [printed = '', answer = ''] = stdout.split('>>>');
  return { answer: JSON.parse(answer), printed: printed + stderr };
}

/** A stand-in for one of the long-running programs. */
function script(text: string): string {
  const file = join(place, 'program.cjs');
  writeFileSync(file, text);
  return `{ name: 'sender', script: '${file}', environment: process.env, logFolder: '${place}/logs' }`;
}

const steady = "setInterval(() => {}, 1000); process.on('SIGTERM', () => process.exit(0));";

describe('a long-running program', () => {
  it('is awaited until it is ready, writes its log, and is ended', () => {
    const options = script(`console.log('hello'); ${steady} process.send({ ready: true });`);
    const { answer } = run(`
      const one = new ManagedProcess(${options});
      await one.start();
      const pid = one.pid;
      await one.stop();
      let lives = true;
      try { process.kill(pid, 0); } catch { lives = false; }
      answer({ lives });
    `);
    expect(answer).toEqual({ lives: false });
    expect(readFileSync(join(place, 'logs', 'sender.log'), 'utf8')).toContain('hello');
  });

  it('is started again when it falls, and that is said', () => {
    const options = script(`
      const { existsSync, writeFileSync } = require('node:fs');
      process.send({ ready: true });
      if (existsSync('${place}/fell')) { writeFileSync('${place}/again', ''); ${steady} }
      else { writeFileSync('${place}/fell', ''); setTimeout(() => process.exit(3), 50); }
    `);
    const { printed } = run(`
      import { existsSync } from 'node:fs';
      const one = new ManagedProcess(${options});
      await one.start();
      while (!existsSync('${place}/again')) await new Promise((settle) => setTimeout(settle, 20));
      await new Promise((settle) => setTimeout(settle, 100));
      await one.stop();
      answer(true);
    `);
    expect(printed).toContain('The sender ended unexpectedly (exit 3). It starts again in 1 s.');
    expect(printed).toContain('The sender runs again.');
  });

  it('that ends at its start is a failure in words, and what it said is shown', () => {
    const options = script("console.error('THREEDAWN_PORT: must be a number'); process.exit(2);");
    const { answer, printed } = run(`
      const one = new ManagedProcess(${options});
      answer(await one.start().then(() => 'ready', (error) => error.message));
    `);
    expect(answer).toMatch(/^The sender ended at its start \(exit 2\); see /);
    expect(printed).toContain('[sender] THREEDAWN_PORT: must be a number');
  });

  it('shows its errors at the terminal and keeps the rest in the log', () => {
    const options = script(`
      console.log(JSON.stringify({ level: 30, msg: 'an ordinary thing' }));
      console.log(JSON.stringify({ level: 50, msg: 'a serious thing' }));
      ${steady} setTimeout(() => process.send({ ready: true }), 100);
    `);
    const { printed } = run(`
      const one = new ManagedProcess(${options});
      await one.start();
      await one.stop();
      answer(true);
    `);
    expect(printed).toContain('[sender] error: a serious thing');
    expect(printed).not.toContain('an ordinary thing');
    expect(readFileSync(join(place, 'logs', 'sender.log'), 'utf8')).toContain('an ordinary thing');
  });

  it('ends with the process that started it, even when that one is killed', async () => {
    const options = script(`${steady} process.send({ ready: true });`);
    const child = spawn(
      process.execPath,
      [
        '--input-type=module',
        '-e',
        `${imports} const one = new ManagedProcess(${options}); await one.start(); console.log(one.pid);`,
      ],
      { stdio: ['ignore', 'pipe', 'inherit'] },
    );
    const pid = Number(await new Promise<string>((settle) => child.stdout.once('data', settle)));
    child.kill('SIGKILL');
    const deadline = Date.now() + 10_000;
    while (runs(pid) && Date.now() < deadline)
      await new Promise((settle) => setTimeout(settle, 20));
    expect(runs(pid)).toBe(false);
  });
});

/** True while a process lives; the dead that nobody reaped do not count. */
function runs(pid: number): boolean {
  try {
    return !/\) [ZX]/.test(readFileSync(`/proc/${pid}/stat`, 'utf8'));
  } catch {
    return false;
  }
}

describe('a data folder', () => {
  it('belongs to one running house at a time; a dead one gives it free', () => {
    const { answer } = run(`
      import { writeFileSync } from 'node:fs';
      const told = () => { try { claim('${place}', 'http://localhost:4300'); return 'mine'; } catch (error) { return error.message; } };
      const release = claim('${place}', 'http://localhost:4300');
      const second = told();
      release();
      const third = told();
      writeFileSync('${place}/running.json', JSON.stringify({ pid: process.pid, program: 'another program', origin: '' }));
      const stale = told();
      writeFileSync('${place}/running.json', '{"pid":');
      const damaged = told();
      answer({ second, third, stale, damaged });
    `);
    expect(answer).toEqual({
      second: expect.stringMatching(/already runs from this folder \(process \d+, http/),
      third: 'mine',
      stale: 'mine',
      damaged: 'mine',
    });
  });

  it('keeps its random secrets, readable by the owner alone', () => {
    const { answer } = run(
      `answer([secretsOf('${place}'), secretsOf('${place}')]);`,
    ) as unknown as { answer: Record<string, string>[] };
    expect(answer[0]).toEqual(answer[1]);
    expect(new Set(Object.values(answer[0] ?? {})).size).toBe(6);
    expect(answer[0]).toMatchObject({
      sessionSecret: expect.stringMatching(/^[0-9a-f]{64}$/),
      smsAccount: expect.stringMatching(/^AC[0-9a-f]{32}$/),
    });
    expect(statSync(join(place, 'secrets.json')).mode & 0o777).toBe(0o600);
  });

  it('says what to do when the secrets are damaged', () => {
    writeFileSync(join(place, 'secrets.json'), '{"sessionSecret":');
    const { answer } = run(
      `try { secretsOf('${place}'); } catch (error) { answer(error.message); }`,
    );
    expect(answer).toMatch(/secrets\.json is damaged\. Put back a copy/);
  });
});

describe('the settings of the programs', () => {
  const filled = (environment: Record<string, string>): Record<string, string> =>
    run(`
      const environment = ${JSON.stringify(environment)};
      const settings = chosenSettings(environment);
      answer({ standIns: settings.standIns, ...programEnvironment({ settings, ports: settings.ports, secrets: secretsOf('${place}'), dataDirectory: '${place}', chromium: '', databasePort: 4316, environment }) });
    `).answer as Record<string, string>;

  it('are filled in for a newcomer', () => {
    expect(filled({})).toMatchObject({
      standIns: true,
      NODE_ENV: 'development',
      THREEDAWN_ORIGIN: 'http://localhost:4300',
      THREEDAWN_SMS_PROVIDER: 'stand-in',
      THREEDAWN_REHEARSAL: 'on',
      THREEDAWN_DATABASE_URL: expect.stringMatching(
        /^mysql:\/\/threedawn_app:\w+@127\.0\.0\.1:4316/,
      ),
    });
  });

  it('are the person’s own where they are set', () => {
    const own = { THREEDAWN_PORT: '8080', THREEDAWN_DATABASE_URL: 'mysql://a:b@db.example.org/c' };
    expect(filled(own)).toMatchObject({ ...own, THREEDAWN_ORIGIN: 'http://localhost:8080' });
  });

  it('pretend nothing in production', () => {
    const production = filled({ NODE_ENV: 'production' });
    expect(production).toMatchObject({ standIns: false, THREEDAWN_REHEARSAL: 'off' });
    expect(Object.keys(production)).not.toContain('THREEDAWN_MAIL_URL');
    expect(Object.keys(production)).not.toContain('TWILIO_AUTH_TOKEN');
  });

  it('hide the account that changes tables from the long-running programs', () => {
    const { answer } = run(
      "answer(withoutMigrateAccount({ A: '1', THREEDAWN_DATABASE_MIGRATE_URL: 'x' }));",
    );
    expect(answer).toEqual({ A: '1' });
  });

  it.each(['http', '0', '70000', '43.5'])('refuse the port "%s"', (port) => {
    expect(() => filled({ THREEDAWN_PORT: port })).toThrow(/THREEDAWN_PORT must be a port number/);
  });
});

describe('npm start', () => {
  it('refuses an old Node.js in words', () => {
    const { answer } = run(
      "try { checkNodeVersion('18.20.1'); } catch (error) { answer(error.message); }",
    );
    expect(answer).toMatch(/needs Node\.js 20\.19\.0 or newer; this is 18\.20\.1/);
  });

  it('says which port is taken, starts nothing and leaves the folder free', async () => {
    const other = createServer();
    await new Promise<void>((settle) => other.listen(0, '127.0.0.1', settle));
    const { port } = other.address() as AddressInfo;
    const child = spawn(process.execPath, [join(bootstrap, 'start.mjs')], {
      env: { ...process.env, THREEDAWN_PORT: String(port), THREEDAWN_DATA_DIR: place },
    });
    let words = '';
    child.stderr.on('data', (chunk: Buffer) => (words += chunk.toString()));
    const code = await new Promise((settle) => child.once('exit', settle));
    await new Promise((settle) => other.close(settle));
    expect(words).toContain(`Port ${port} for the web pages is taken by another program.`);
    expect(code).toBe(1);
    expect(() => statSync(join(place, 'running.json'))).toThrow('ENOENT');
  });
});
