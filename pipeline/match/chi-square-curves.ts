import { type Kind, KINDS } from '../../templates/family.ts';
import type { RedshiftCurve } from './minima.ts';

/** Chi-square of one kind against redshift, thinned for display. */
export interface KindCurve {
  readonly kind: Kind;
  /** Middle of each bin. */
  readonly redshift: Float64Array;
  /** Smallest of all families of the kind within the bin; NaN where nothing was tried. */
  readonly chiSquare: Float64Array;
}

/**
 * Thins the scans of all families to one curve per kind. Bins are equal in ln(1+z) and keep their smallest
 * value: no minimum is lost by thinning.
 *
 * @param points most bins per curve, >= 1
 */
export function chiSquareCurves(scans: readonly RedshiftCurve[], points: number): KindCurve[] {
  return KINDS.flatMap((kind) => {
    const own = scans.filter((scan) => scan.kind === kind && scan.chiSquare.length > 0);
    if (own.length === 0) return [];
    const start = Math.min(...own.map((scan) => scan.lnStart));
    const end = Math.max(...own.map((scan) => scan.lnStart + (scan.chiSquare.length - 1) * scan.step));
    const step = Math.max(own[0]!.step, (end - start) / points);
    const bins = Math.min(points, Math.floor((end - start) / step) + 1);
    const chiSquare = new Float64Array(bins).fill(NaN);
    for (const scan of own) {
      scan.chiSquare.forEach((value, i) => {
        const bin = Math.min(bins - 1, Math.floor((scan.lnStart + i * scan.step - start) / step + 1e-9));
        if (!(chiSquare[bin]! <= value) && Number.isFinite(value)) chiSquare[bin] = value;
      });
    }
    const redshift = Float64Array.from({ length: bins }, (_, b) => Math.expm1(start + (b + 0.5) * step));
    return [{ kind, redshift, chiSquare }];
  });
}
