import { existsSync, mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Command } from 'commander';

/** Exit status: everything agrees; something does not; wrong usage. */
const EXIT_DISAGREES = 1;
const EXIT_USAGE = 2;
/** Line spread families are listed for when none is given: R = 2000, km/s. */
const DEFAULT_LINE_SPREAD_KM_S = 60;

/**
 * Adds `shiftwork templates` with the verbs `list`, `show`, `build` and `verify`.
 * Exit status 0 on success, 1 when files do not agree with manifest or recipe, 2 on wrong usage.
 */
export function registerTemplates(program: Command): void {
  const templates = program
    .command('templates')
    .description('the template families: list, show, build, verify');
  templates
    .command('list')
    .description('list the families with their redshift ranges and sizes')
    .option('--line-spread <km/s>', 'instrument sigma to prepare for', String(DEFAULT_LINE_SPREAD_KM_S))
    .action(async (options: { lineSpread: string }) => {
      process.exitCode = await list(options.lineSpread);
    });
  templates
    .command('show')
    .description('list the components of one family')
    .argument('<family>', 'name as `templates list` prints it')
    .option('--redshift <z>', 'redshift to show them at; default: the middle of the family’s range')
    .option('--line-spread <km/s>', 'instrument sigma to prepare for', String(DEFAULT_LINE_SPREAD_KM_S))
    .action(async (family: string, options: { redshift?: string; lineSpread: string }) => {
      process.exitCode = await show(family, options);
    });
  templates
    .command('build')
    .description('generate the family files from physics and a list of atomic lines')
    .requiredOption(
      '--lines <file>',
      'CSV: air wavelength (Å), atomic number, ion, lower energy (eV), log gf',
    )
    .option('--out <folder>', 'where to write; default: the installed families')
    .option('--keep-stars', 'use the stars.fits that is there (making it takes about ten minutes)')
    .addHelpText('after', '\nExample:\n  shiftwork templates build --lines lines.csv --out my-families')
    .action(async (options: { lines: string; out?: string; keepStars?: true }) => {
      process.exitCode = await build(options);
    });
  templates
    .command('verify')
    .description('check the family files against their manifest, and rebuild what can be rebuilt to compare')
    .option('--lines <file>', 'the line list they were made from: also rebuilds quasars and two stars')
    .action(async (options: { lines?: string }) => {
      process.exitCode = await verify(options.lines);
    });
}

async function list(lineSpread: string): Promise<number> {
  const { installedLibrary } = await import('./installed-families.ts');
  const sigma = positive('--line-spread', lineSpread);
  if (sigma === null) return EXIT_USAGE;
  const library = installedLibrary();
  print(`library ${library.hash}`);
  print('family               kind     redshift          vectors  components  refit set');
  for (const family of library.familiesFor(sigma)) {
    const range = `${family.redshiftMin.toFixed(3)} … ${family.redshiftMax.toFixed(3)}`;
    const count = family.componentsAt(middleOf(family)).length;
    print(
      [
        family.name.padEnd(20),
        family.kind.padEnd(8),
        range.padEnd(17),
        String(family.basis.length).padStart(7),
        String(count).padStart(11),
        ` ${family.refitSet}`,
      ].join(' '),
    );
  }
  return 0;
}

async function show(name: string, options: { redshift?: string; lineSpread: string }): Promise<number> {
  const { installedLibrary } = await import('./installed-families.ts');
  const sigma = positive('--line-spread', options.lineSpread);
  if (sigma === null) return EXIT_USAGE;
  const families = installedLibrary().familiesFor(sigma);
  const family = families.find((one) => one.name === name);
  if (!family) {
    complain(`family must be one of ${families.map((one) => one.name).join(', ')}, got ${name}`);
    return EXIT_USAGE;
  }
  const redshift = options.redshift === undefined ? middleOf(family) : Number(options.redshift);
  if (!Number.isFinite(redshift)) {
    complain(`--redshift must be a number, got ${options.redshift ?? ''}`);
    return EXIT_USAGE;
  }
  const angstrom = (pixel: number): string =>
    Math.exp(family.componentGrid.lnStart + pixel * family.componentGrid.step).toFixed(1);
  print(`${family.name} at redshift ${redshift}, rest wavelengths in vacuum ångström`);
  for (const { label, role, group, first, end } of family.componentsAt(redshift)) {
    const extent = `${angstrom(first)} … ${angstrom(end - 1)}`;
    print(`${label.padEnd(36)} ${role.padEnd(17)} ${extent.padEnd(20)} ${group}`.trimEnd());
  }
  return 0;
}

async function build(options: { lines: string; out?: string; keepStars?: true }): Promise<number> {
  const { familyFolder } = await import('../worker/recipe.ts');
  const { replaceFile, writeDerivedFamilies } = await import('./derived-families.ts');
  const folder = options.out ?? familyFolder();
  if (!existsSync(options.lines)) {
    complain(`--lines must name a file, got ${options.lines}`);
    return EXIT_USAGE;
  }
  mkdirSync(folder, { recursive: true });
  const starsPath = join(folder, 'stars.fits');
  if (options.keepStars === true && !existsSync(starsPath)) {
    complain(`--keep-stars needs ${starsPath}, it is missing`);
    return EXIT_USAGE;
  }
  if (options.keepStars !== true) {
    const { synthesizeStars } = await import('./star-synthesis.ts');
    replaceFile(starsPath, synthesizeStars(readFileSync(options.lines, 'utf8'), print));
  }
  for (const line of writeDerivedFamilies(folder, new Uint8Array(readFileSync(starsPath)), options.lines)) {
    print(line);
  }
  return 0;
}

async function verify(lines: string | undefined): Promise<number> {
  if (lines !== undefined && !existsSync(lines)) {
    complain(`--lines must name a file, got ${lines}`);
    return EXIT_USAGE;
  }
  const { verifyFamilies } = await import('./verify-families.ts');
  const disagreements = verifyFamilies(lines === undefined ? null : readFileSync(lines, 'utf8'), print);
  for (const one of disagreements) complain(one);
  print(disagreements.length === 0 ? 'all agree' : `${disagreements.length} do not agree`);
  return disagreements.length === 0 ? 0 : EXIT_DISAGREES;
}

const middleOf = (family: { redshiftMin: number; redshiftMax: number }): number =>
  0.5 * (family.redshiftMin + family.redshiftMax);

function positive(option: string, text: string): number | null {
  const value = Number(text);
  if (value > 0 && value < Infinity) return value;
  complain(`${option} must be a positive number, got ${text}`);
  return null;
}

function print(line: string): void {
  process.stdout.write(`${line}\n`);
}

function complain(line: string): void {
  process.stderr.write(`${line}\n`);
}
