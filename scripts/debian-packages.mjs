// What this project takes from Debian, and how it gets there. Node built-ins only.
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';

const hasPostgres = () =>
  existsSync('/usr/lib/postgresql') &&
  readdirSync('/usr/lib/postgresql').some((version) =>
    existsSync(`/usr/lib/postgresql/${version}/bin/postgres`),
  );

/** Debian package to the test that tells whether it is there. */
const packages = {
  postgresql: hasPostgres,
  chromium: () => existsSync('/usr/bin/chromium'),
  graphviz: () => existsSync('/usr/bin/dot'),
  'glpk-utils': () => existsSync('/usr/bin/glpsol'),
  'coinor-cbc': () => existsSync('/usr/bin/cbc'),
};

/**
 * Installs what is missing as root; tells an ordinary user what to install.
 * @param {(keyof typeof packages)[]} names
 */
export function ensureDebianPackages(names) {
  const missing = names.filter((name) => !packages[name]());
  if (missing.length === 0) return;
  const command = `apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  if (process.getuid?.() !== 0) {
    throw new Error(`Missing Debian packages. Ask an administrator to run:\n  apt-get update && ${command}`);
  }
  console.log(`Installing Debian packages: ${missing.join(', ')}`);
  // Without this file the package makes a system-wide server on port 5432, which nobody here needs.
  if (missing.includes('postgresql') && !existsSync('/etc/postgresql-common/createcluster.conf')) {
    mkdirSync('/etc/postgresql-common', { recursive: true });
    writeFileSync('/etc/postgresql-common/createcluster.conf', 'create_main_cluster = false\n');
  }
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  for (const args of [['update', '-qq'], command.split(' ').slice(1)]) {
    const result = spawnSync('apt-get', args, { env, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] });
    if (result.status !== 0) throw new Error(`apt-get ${args[0]} failed:\n${result.stdout}${result.stderr}`);
  }
}
