import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { Client } from 'pg';
import { clusterHome, startCluster } from '@foldwright/server/setup/cluster.mjs';
import { processIdentity } from '@foldwright/server/setup/processes.mjs';
import { until } from './watched-process';
import { answersOn } from '@foldwright/server/setup/ports.mjs';

jest.setTimeout(60_000);

const isRoot = process.getuid?.() === 0;

describe('startCluster', () => {
  let folder: string;
  beforeEach(() => {
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'cluster-'));
    fs.chmodSync(folder, 0o755);
  });
  afterEach(() => fs.rmSync(folder, { recursive: true, force: true }));

  const answer = async (connectionString: string): Promise<string> => {
    const client = new Client({ connectionString });
    await client.connect();
    try {
      const { rows } = await client.query<{ address: string }>('SELECT host(inet_server_addr()) AS address');
      return rows[0]?.address ?? '';
    } finally {
      await client.end();
    }
  };

  it('answers on loopback alone, lets nobody in without the password, and keeps its content', async () => {
    const home = path.join(folder, 'postgres');
    const cluster = await startCluster({ home });
    try {
      expect(cluster.wasRunning).toBe(false);
      cluster.ensureDatabase('kept');
      cluster.ensureDatabase('kept');
      expect(await answer(cluster.ownerUrl('kept'))).toBe('127.0.0.1');
      expect(cluster.query('SHOW listen_addresses')).toBe('127.0.0.1');
      expect(cluster.query('SHOW unix_socket_directories')).toBe('');
      expect(cluster.query('SHOW fsync')).toBe('on');

      const guess = new URL(cluster.ownerUrl('kept'));
      guess.password = 'guessed';
      await expect(answer(guess.href)).rejects.toThrow(/password authentication failed/);
      expect(fs.statSync(cluster.home).mode & 0o777).toBe(0o700);

      const joined = await startCluster({ home });
      expect(joined.wasRunning).toBe(true);
      expect(joined.port).toBe(cluster.port);
    } finally {
      await cluster.stop();
    }
    expect(await answersOn(cluster.port)).toBe(false);
    await cluster.stop();

    const again = await startCluster({ home });
    try {
      expect(again.wasRunning).toBe(false);
      expect(again.query("SELECT count(*) FROM pg_database WHERE datname = 'kept'")).toBe('1');
    } finally {
      await again.stop();
    }
  });

  it('takes another port when the one wished for is taken', async () => {
    const other = net.createServer().listen(0, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));
    const address = other.address();
    const taken = typeof address === 'object' && address !== null ? address.port : 0;
    const cluster = await startCluster({ home: path.join(folder, 'postgres'), port: taken, isDisposable: true });
    try {
      expect(cluster.port).not.toBe(taken);
      expect(await answer(cluster.ownerUrl())).toBe('127.0.0.1');
    } finally {
      await cluster.stop();
      other.close();
    }
  });

  it('starts again after its server was killed', async () => {
    const home = path.join(folder, 'postgres');
    const cluster = await startCluster({ home, isDisposable: true });
    const server = Number(fs.readFileSync(path.join(cluster.home, 'data/postmaster.pid'), 'utf8').split('\n')[0]);
    process.kill(server, 'SIGKILL');
    // A signal is on its way for a moment; what is tried is what it leaves: a zombie, a lock file, children.
    await until('the end of the server', () => processIdentity(server) === undefined, 10_000);
    const again = await startCluster({ home });
    try {
      expect(await answer(again.ownerUrl())).toBe('127.0.0.1');
    } finally {
      await again.stop();
    }
  });

  it('says what the server said when it cannot start', async () => {
    const home = path.join(folder, 'postgres');
    const cluster = await startCluster({ home, isDisposable: true });
    await cluster.stop();
    fs.rmSync(path.join(cluster.home, 'data/global'), { recursive: true });
    await expect(startCluster({ home })).rejects.toThrow(
      /pg_ctl failed \(exit 1\)[^]*could not find the database system/,
    );
  });
});

describe('clusterHome', () => {
  // Only root runs the database under another account, so only then can a folder be closed to it.
  const closedFolders = isRoot ? [0o700, 0o750] : [];

  it('is where it was asked for when the database may go there', () => {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'open-'));
    fs.chmodSync(folder, 0o755);
    expect(clusterHome(path.join(folder, 'data/postgres'))).toBe(path.join(folder, 'data/postgres'));
    fs.rmSync(folder, { recursive: true });
  });

  it('is a folder of its own under /var/tmp when it may not', () => {
    for (const mode of closedFolders) {
      const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'closed-'));
      fs.chmodSync(folder, mode);
      const home = clusterHome(path.join(folder, 'data/postgres'));
      expect(home).toMatch(/^\/var\/tmp\/foldwright-[0-9a-f]{16}$/);
      expect(clusterHome(path.join(folder, 'other/postgres'))).not.toBe(home);
      fs.rmSync(folder, { recursive: true });
    }
    expect(closedFolders.length > 0).toBe(isRoot);
  });
});

describe('what a start finds missing', () => {
  const debian = path.resolve(__dirname, '../../server/src/setup/debian.mjs');
  const asNobody = (code: string) =>
    spawnSync(
      process.execPath,
      ['--input-type=module', '-e', `import { ensureDebianPackages } from ${JSON.stringify(debian)};\n${code}`],
      { encoding: 'utf8', timeout: 20_000 },
    );

  it('is said in one line to an account that may not install it', () => {
    // The check asks for the account by process.getuid and for the programs by what PATH and the usual folders hold.
    const { stdout } = asNobody(`
      import fs from 'node:fs';
      import { syncBuiltinESMExports } from 'node:module';
      process.getuid = () => 65534;
      fs.existsSync = () => false;
      syncBuiltinESMExports();
      try { ensureDebianPackages({ forTests: true }); } catch (error) { process.stdout.write(error.message); }
    `);
    expect(stdout).toContain('apt-get install --yes postgresql chromium qpdf poppler-utils python3-ezdxf');
  });
});
