import type { FitsFile, Layout, OpenedInput, Spectrum } from '../pipeline/decode/index.ts';
import { readSpectra, recogniseLayout } from '../pipeline/decode/index.ts';
import type { InputProfile } from '../config/profile.ts';
import { median } from '../pipeline/core/quantile.ts';
import { InputFault } from '../pipeline/errors.ts';

/** One HDU in a line. */
interface HduLine {
  readonly hdu: number;
  readonly type: string;
  readonly name: string;
  readonly shape: string;
  readonly unit: string;
  readonly columns: readonly string[];
}

/** What there is to say about one arm of the first readable spectrum. */
interface ArmSummary {
  readonly name: string;
  readonly pixels: number;
  readonly fromVacuumAngstrom: number;
  readonly toVacuumAngstrom: number;
  readonly goodFraction: number;
  readonly medianSignalToNoisePerPixel: number | null;
  readonly noise: string;
}

/** Everything `inspect` says about one file. JSON-safe. */
export interface InspectReport {
  readonly file: string;
  readonly kind: OpenedInput['kind'];
  readonly walkFault: string | null;
  readonly hdus: readonly HduLine[];
  readonly layout: Layout | null;
  /** Why no layout was recognised. */
  readonly fault: string | null;
  readonly firstSpectrum: (Omit<Spectrum, 'arms'> & { readonly arms: readonly ArmSummary[] }) | null;
  /** Faults of rows before the first readable one. */
  readonly rowFaults: readonly string[];
}

/** Rows tried before giving up on finding a readable one. */
const ROWS_TRIED = 50;

/**
 * Look at one opened file.
 *
 * @param profile overrides what would be recognised
 */
export function inspectInput(input: OpenedInput, profile?: InputProfile): InspectReport {
  const { file, kind } = input;
  const base = { file: file.label, kind, walkFault: file.fault?.message ?? null, hdus: hduLines(file) };
  let layout: Layout;
  try {
    layout = recogniseLayout(input, profile);
  } catch (error) {
    if (!(error instanceof InputFault)) throw error;
    return { ...base, layout: null, fault: error.message, firstSpectrum: null, rowFaults: [] };
  }
  const rowFaults: string[] = [];
  for (let row = 0; row < Math.min(layout.rowCount, ROWS_TRIED); row += 1) {
    const spectrum = readSpectra(input, layout, row, 1)[0]!;
    if (!(spectrum instanceof InputFault)) {
      const firstSpectrum = { ...spectrum, arms: spectrum.arms.map(summaryOfArm) };
      return { ...base, layout, fault: null, firstSpectrum, rowFaults };
    }
    rowFaults.push(spectrum.message);
  }
  return { ...base, layout, fault: null, firstSpectrum: null, rowFaults };
}

/** The report as lines for a person. */
export function inspectLines(report: InspectReport): string[] {
  const lines = [`${report.file}: ${report.kind}`];
  for (const { hdu, type, name, shape, unit, columns } of report.hdus) {
    const title = [`HDU ${hdu}`, type, name === '' ? '' : `'${name}'`, shape, unit === '' ? '' : `[${unit}]`];
    lines.push(`  ${title.filter((part) => part !== '').join(' ')}`);
    if (columns.length > 0) lines.push(`    columns: ${columns.join(', ')}`);
  }
  if (report.walkFault !== null) lines.push(`  stopped: ${report.walkFault}`);
  if (report.layout === null) return [...lines, '', `not readable: ${report.fault ?? ''}`];
  const { layout, firstSpectrum } = report;
  lines.push(
    '',
    `${layout.rowCount} spectra, ${layout.arms.length} arm(s), form ${layout.form}, frame ${layout.frame}`,
  );
  lines.push('recognised:', ...layout.recognised.map((sentence) => `  ${sentence}`));
  lines.push(
    'missing:',
    ...(layout.missing.length === 0 ? ['nothing'] : layout.missing).map((s) => `  ${s}`),
  );
  for (const fault of report.rowFaults) lines.push(`unreadable: ${fault}`);
  if (firstSpectrum === null) return [...lines, 'no readable spectrum'];
  const { inputRow, targetName, role, raDeg, decDeg, observedAt } = firstSpectrum;
  const facts = [
    inputRow === null ? '' : `row ${inputRow}`,
    targetName === null ? 'no name' : `target ${targetName}`,
    `role ${role}`,
    raDeg === null || decDeg === null ? 'no position' : `at ${raDeg.toFixed(5)} ${decDeg.toFixed(5)}`,
    observedAt === null ? 'no time' : `middle ${observedAt}`,
  ];
  lines.push(`first spectrum: ${facts.filter((fact) => fact !== '').join(', ')}`);
  for (const arm of firstSpectrum.arms) {
    const range = `${arm.fromVacuumAngstrom.toFixed(2)}-${arm.toVacuumAngstrom.toFixed(2)} Å (vacuum)`;
    const signal = arm.medianSignalToNoisePerPixel?.toFixed(2) ?? 'unknown';
    const good = `${(100 * arm.goodFraction).toFixed(1)} % usable`;
    const name = arm.name === '' ? '' : `${arm.name}: `;
    lines.push(
      `  ${name}${range}, ${arm.pixels} pixels, ${good}, median S/N ${signal} per pixel, noise ${arm.noise}`,
    );
  }
  return [...lines, ...firstSpectrum.notes.map((note) => `  note: ${note}`)];
}

function hduLines(file: FitsFile): HduLine[] {
  return file.hdus.map((hdu) => {
    const base = { hdu: hdu.index, type: hdu.type, name: hdu.name };
    if (hdu.type === 'image') {
      const unit = hdu.header.get('BUNIT');
      const shape = hdu.axes.length === 0 ? 'no data' : hdu.axes.join(' x ');
      return { ...base, shape, unit: typeof unit === 'string' ? unit.trim() : '', columns: [] };
    }
    if (hdu.type === 'other') return { ...base, shape: hdu.reason, unit: '', columns: [] };
    const columns = hdu.columns.map(({ name, code, repeat, unit }) => {
      const count = repeat === 1 ? '' : `${repeat}`;
      return `${name} (${count}${code}${unit === '' ? '' : `, ${unit}`})`;
    });
    return { ...base, shape: `${hdu.rowCount} rows`, unit: '', columns };
  });
}

function summaryOfArm(arm: Spectrum['arms'][number]): ArmSummary {
  const { flux, inverseVariance, wavelengthVacuumAngstrom: wave } = arm;
  const signal = flux.map((value, i) =>
    inverseVariance[i]! > 0 ? value * Math.sqrt(inverseVariance[i]!) : NaN,
  );
  const typical = median(signal);
  return {
    name: arm.name,
    pixels: flux.length,
    fromVacuumAngstrom: wave[0]!,
    toVacuumAngstrom: wave[wave.length - 1]!,
    goodFraction: signal.filter(Number.isFinite).length / flux.length,
    medianSignalToNoisePerPixel: Number.isFinite(typical) ? typical : null,
    noise: arm.noiseSource,
  };
}
