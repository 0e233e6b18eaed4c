import { spawn, spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const folder = join(__dirname, '..', '..', 'server', 'database', 'local-server');
const imports = `
  import { startLocalServer, startThrowawayServer } from '${folder}/local-server.mjs';
  import { prepareSchema, databaseUrl } from '${folder}/accounts.mjs';
  import { runAsRoot } from '${folder}/root-client.mjs';
  import { processLives } from '${folder}/running-instance.mjs';
`;

/** Runs a program on the private database in a process of its own and answers what it printed. */
function run(program: string): unknown {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--input-type=module', '-e', `${imports}\n${program}`],
    { encoding: 'utf8', timeout: 60_000 },
  );
  if (status !== 0) throw new Error(stderr);
  return JSON.parse(stdout);
}

describe('the private database', () => {
  it('keeps what was committed when it is stopped and started again', () => {
    const place = mkdtempSync(join(tmpdir(), 'threedawn-database-'));
    try {
      const answer = run(`
        const options = { dataDirectory: '${place}/mariadb', port: 'any', durable: true };
        const first = await startLocalServer(options);
        const settings = await runAsRoot(first, 'SELECT @@innodb_flush_log_at_trx_commit, @@innodb_doublewrite;');
        await runAsRoot(first, 'CREATE DATABASE kept; CREATE TABLE kept.one (id INT); INSERT INTO kept.one VALUES (7);');
        await first.stop();
        const second = await startLocalServer(options);
        const rows = await runAsRoot(second, 'SELECT id FROM kept.one;');
        await second.stop();
        console.log(JSON.stringify({ settings: settings.trim().split('\\t'), rows: rows.trim() }));
      `);
      expect(answer).toEqual({ settings: ['1', '1'], rows: '7' });
    } finally {
      rmSync(place, { recursive: true });
    }
  });

  it('says in words that another one runs on the same data, or that the port is taken', () => {
    const answer = run(`
      const server = await startThrowawayServer();
      const told = async (options) => startLocalServer({ durable: false, ...options }).then(() => 'started', ({ code, message }) => [code, message]);
      const same = await told({ dataDirectory: server.folder + '/mariadb', port: 'any' });
      const port = await told({ dataDirectory: server.folder + '/other', port: server.port });
      await server.stop();
      console.log(JSON.stringify({ same, port }));
    `);
    expect(answer).toEqual({
      same: ['runs-already', expect.stringMatching(/already runs on .* \(process \d+\)/)],
      port: ['port-taken', expect.stringMatching(/^Port \d+ .* is taken by another program/)],
    });
  });

  it('begins again when it was cut off while being made', () => {
    const answer = run(`
      import { mkdirSync, writeFileSync, mkdtempSync, rmSync } from 'node:fs';
      const place = mkdtempSync('${tmpdir()}/threedawn-database-');
      mkdirSync(place + '/mariadb.tmp/mysql', { recursive: true });
      writeFileSync(place + '/mariadb.tmp/half', '');
      const server = await startLocalServer({ dataDirectory: place + '/mariadb', port: 'any', durable: false });
      const answer = await runAsRoot(server, 'SELECT 1;');
      await server.stop();
      rmSync(place, { recursive: true });
      console.log(JSON.stringify(answer.trim()));
    `);
    expect(answer).toBe('1');
  });

  it('lets each account do what it must, and no more', () => {
    const answer = run(`
      import mariadb from 'mariadb';
      const server = await startThrowawayServer();
      const passwords = { app: "a'b\\\\c", migrate: 'm%40' };
      await prepareSchema(server, 'threedawn', passwords);
      const connect = (account, password) => mariadb.createConnection({ host: '127.0.0.1', port: server.port, user: account, password, database: 'threedawn' });
      const code = (work) => work.then(() => 'done', (error) => error.code);
      const migrate = await connect('threedawn_migrate', passwords.migrate);
      await migrate.query('CREATE TABLE ledger (id INT PRIMARY KEY)');
      await migrate.query("GRANT SELECT, INSERT ON ledger TO 'threedawn_app'@'127.0.0.1'");
      const app = await connect('threedawn_app', passwords.app);
      const answer = {
        insert: await code(app.query('INSERT INTO ledger VALUES (1)')),
        delete: await code(app.query('DELETE FROM ledger')),
        create: await code(app.query('CREATE TABLE other (id INT)')),
        accounts: await code(app.query('SELECT * FROM mysql.global_priv')),
        elsewhere: await code(migrate.query('CREATE DATABASE elsewhere')),
        root: await code(mariadb.createConnection({ host: '127.0.0.1', port: server.port, user: 'root' })),
      };
      await app.end();
      await migrate.end();
      await server.stop();
      console.log(JSON.stringify(answer));
    `);
    expect(answer).toEqual({
      insert: 'done',
      delete: 'ER_TABLEACCESS_DENIED_ERROR',
      create: 'ER_TABLEACCESS_DENIED_ERROR',
      accounts: 'ER_TABLEACCESS_DENIED_ERROR',
      elsewhere: 'ER_DBACCESS_DENIED_ERROR',
      root: expect.stringMatching(/^ER_(HOST_NOT_PRIVILEGED|ACCESS_DENIED_ERROR)$/),
    });
  });

  it('ends by itself when the process that started it is killed', async () => {
    const child = spawn(
      process.execPath,
      [
        '--input-type=module',
        '-e',
        `${imports}
        const server = await startThrowawayServer();
        console.log(JSON.stringify({ pid: server.pid, folder: server.folder }));
        setInterval(() => {}, 1000);`,
      ],
      { stdio: ['ignore', 'pipe', 'inherit'] },
    );
    const line = await new Promise<string>((settle) => child.stdout.once('data', settle));
    const { pid, folder: place } = JSON.parse(line) as { pid: number; folder: string };
    expect(existsSync(`/proc/${pid}`)).toBe(true);
    const gone = new Promise((settle) => child.once('exit', settle));
    child.kill('SIGKILL');
    await gone;
    const deadline = Date.now() + 20_000;
    const lives = (): unknown => run(`console.log(JSON.stringify(processLives(${pid})))`);
    while (lives() && Date.now() < deadline) await new Promise((settle) => setTimeout(settle, 50));
    expect(lives()).toBe(false);
    // A clean end takes its pid file along.
    expect(readdirSync(join(place, 'mariadb'))).not.toContain('mariadbd.pid');
    rmSync(place, { recursive: true });
  });
});
