import { spawnSync } from 'node:child_process';
import { findCommand } from './find-command.mjs';

/**
 * What the product takes from Debian. `isThere` looks for the thing itself, so another way of installing it counts.
 * Without an optional one the product works, only worse: `without` says how.
 */
const packages = [
  {
    name: 'mariadb-server',
    needs: 'database',
    isThere: () => findCommand('mariadbd') && findCommand('mariadb-install-db'),
  },
  { name: 'redis-server', needs: 'queue', isThere: () => findCommand('redis-server') },
  {
    name: 'libopenblas0-pthread',
    needs: 'numerics',
    isThere: () => hasLibrary('libopenblas.so.0'),
    without: 'readouts are computed in plain JavaScript, which is many times slower',
  },
  {
    name: 'liblapacke',
    needs: 'numerics',
    isThere: () => hasLibrary('liblapacke.so.3'),
    without: 'readouts are computed in plain JavaScript, which is many times slower',
  },
  { name: 'chromium', needs: 'browser', isThere: () => process.env.CHROMIUM_PATH || findCommand('chromium') },
  // The README's worked example, which is run as a test, is written with these two.
  { name: 'curl', needs: 'browser', isThere: () => findCommand('curl') },
  { name: 'jq', needs: 'browser', isThere: () => findCommand('jq') },
];

/** The packages that are missing for the given needs ('database', 'queue', 'numerics', 'browser'). */
export function missingPackages(needs) {
  return packages.filter((entry) => needs.includes(entry.needs) && !entry.isThere());
}

/**
 * Installs what is missing with apt, as root or through a sudo that asks nothing. System services that the packages
 * bring along are neither started nor left enabled: the product runs its own, on its own ports and data.
 *
 * @throws Error with the list of what to install when that is not possible
 */
export function installMissingPackages(needs, say) {
  const missing = missingPackages(needs);
  if (missing.length === 0) return;
  const names = missing.map(({ name }) => name);
  const asRoot = rootCommand();
  if (asRoot) {
    say(`Installing from Debian: ${names.join(', ')} …`);
    const [command, ...args] = [...asRoot, '/bin/sh', '-c', installScript, 'install', ...names];
    const { status, stdout, stderr } = spawnSync(command, args, {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    if (status !== 0)
      say(`apt could not install them:\n${`${stdout}\n${stderr}`.trim().split('\n').slice(-15).join('\n')}`);
  }
  const still = missingPackages(needs);
  for (const { name, without } of still) if (without) say(`${name} is missing: ${without}.`);
  const required = still.filter(({ without }) => !without);
  if (required.length > 0)
    throw new Error(
      [
        'These Debian packages are missing. Install them, then start again:',
        `  sudo apt-get update && sudo apt-get install ${still.map(({ name }) => name).join(' ')}`,
        'Or use services that run elsewhere: docker-less-setup.md tells how.',
      ].join('\n'),
    );
}

const installScript = `
set -e
export DEBIAN_FRONTEND=noninteractive
made=
# Debian's own switch against starting services on installation.
if [ ! -e /usr/sbin/policy-rc.d ]; then
  printf '#!/bin/sh\\nexit 101\\n' > /usr/sbin/policy-rc.d
  chmod 755 /usr/sbin/policy-rc.d
  made=1
fi
trap '[ -z "$made" ] || rm -f /usr/sbin/policy-rc.d' EXIT
# Lists of an earlier update may be enough.
apt-get -q -o DPkg::Lock::Timeout=600 update || true
apt-get -q -o DPkg::Lock::Timeout=600 install -y --no-install-recommends "$@"
if [ -d /run/systemd/system ]; then
  for name in "$@"; do
    case "$name" in
      mariadb-server) systemctl disable mariadb.service || true ;;
      redis-server) systemctl disable redis-server.service || true ;;
    esac
  done
fi
`;

/** The words to put before a command so that it runs as root, or undefined where that is not possible unasked. */
function rootCommand() {
  if (!findCommand('apt-get')) return undefined;
  if (process.getuid() === 0) return [];
  const sudo = findCommand('sudo');
  if (sudo && spawnSync(sudo, ['-n', 'true'], { stdio: 'ignore' }).status === 0) return [sudo, '-n'];
  return undefined;
}

function hasLibrary(name) {
  const ldconfig = findCommand('ldconfig');
  if (!ldconfig) return false;
  return spawnSync(ldconfig, ['-p'], { encoding: 'utf8' }).stdout?.includes(name) ?? false;
}
