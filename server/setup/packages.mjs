import { existsSync } from 'node:fs';
import { findProgram } from './programs.mjs';
import { run, SetupFault } from './run.mjs';

const program = (name) => () => findProgram(name) !== undefined;
const file = (path) => () => existsSync(path);

/** Debian package → whether what we need of it is here already, from wherever it came. */
const isHere = {
  'mariadb-server-core': () => Boolean(findProgram('mariadbd') && findProgram('mariadb-install-db')),
  'mariadb-client-core': program('mariadb'),
  chromium: program('chromium'),
  gcc: program('gcc'),
  'g++': program('g++'),
  'libc6-dev': file('/usr/include/stdio.h'),
  'gcc-avr': program('avr-gcc'),
  'avr-libc': file('/usr/lib/avr/include/avr/pgmspace.h'),
  'apache2-bin': program('apache2'),
  openssl: program('openssl'),
  ngspice: program('ngspice'),
  python3: file('/usr/bin/python3'),
  clang: program('clang'),
  'gcc-arm-none-eabi': program('arm-none-eabi-gcc'),
  'qemu-system-arm': program('qemu-system-arm'),
  'gcc-riscv64-unknown-elf': program('riscv64-unknown-elf-gcc'),
  'qemu-system-misc': program('qemu-system-riscv32'),
  rustc: program('rustc'),
  iverilog: program('iverilog'),
  'python3-numpy': file('/usr/lib/python3/dist-packages/numpy/__init__.py'),
  sox: program('sox'),
  srecord: program('srec_cat'),
  'espeak-ng': program('espeak-ng'),
  'python3-scipy': file('/usr/lib/python3/dist-packages/scipy/__init__.py'),
};

export const databasePackages = ['mariadb-server-core', 'mariadb-client-core'];
export const numpyPackages = ['python3', 'python3-numpy'];
/** Compilers, simulators and readers that judge the firmware targets. */
export const proofPackages = [
  'gcc',
  'g++',
  'libc6-dev',
  'clang',
  'gcc-avr',
  'avr-libc',
  'gcc-arm-none-eabi',
  'qemu-system-arm',
  'gcc-riscv64-unknown-elf',
  'qemu-system-misc',
  'rustc',
  'iverilog',
  'srecord',
  'sox',
  'python3',
];
export const testPackages = [
  ...new Set([
    'chromium',
    ...proofPackages,
    'apache2-bin',
    'openssl',
    'ngspice',
    ...numpyPackages,
    'python3-scipy',
    'sox',
    'srecord',
    'espeak-ng',
  ]),
];

const missingOf = (names) => names.filter((name) => !isHere[name]());

/** Installs what is missing; without the right to do so, says what to type instead. */
export async function ensurePackages(names, { output } = {}) {
  const missing = missingOf(names);
  if (missing.length === 0) return;
  const install = ['install', '--yes', '--no-install-recommends', ...missing];
  if (process.getuid?.() !== 0) {
    throw new SetupFault(
      `Some programs are missing. Install them with this line, then try again:\n\n  sudo apt-get ${install.join(' ')}\n`,
    );
  }
  if (!findProgram('apt-get')) {
    throw new SetupFault(`Missing: ${missing.join(', ')}. There is no apt-get here: install them by hand.`);
  }
  console.error(`Installing ${missing.join(', ')} …`);
  const options = { output: output ?? 'stderr', env: { DEBIAN_FRONTEND: 'noninteractive' } };
  const aptGet = async (args) =>
    (await run('apt-get', ['-qq', '-o=Dpkg::Use-Pty=0', ...args], options)).status === 0;
  // A fresh machine has no package lists, an old one has outdated ones: both are mended by an update.
  const done = (await aptGet(install)) || ((await aptGet(['update'])) && (await aptGet(install)));
  const stillMissing = missingOf(names);
  if (!done || stillMissing.length > 0) {
    throw new SetupFault(`apt-get could not install ${stillMissing.join(', ')}; what it said stands above.`);
  }
}
