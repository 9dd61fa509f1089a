import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { Kind } from '../../templates/family.ts';
import { LANDMARK_LINES } from './landmark-lines.ts';
import type { LineMark } from './payload.ts';

/** Speed of light, km/s, exact by the definition of the metre. */
const SPEED_OF_LIGHT_KM_S = 299_792.458;

/**
 * Where the landmark lines of the best answer and of the runner-up should fall on the wavelength axis as read.
 * Redshifts are barycentric; where this program moved the axis, 1 + z(observed) = (1 + z) / (1 + v/c)
 * with v the velocity added (Wright & Eastman 2014, PASP 126, 838, eq. 2 to first order).
 *
 * @param from shortest observed wavelength of the data, ångström
 * @param to longest observed wavelength
 */
export function lineMarks(row: CatalogueRow, from: number, to: number): readonly LineMark[] {
  const added = row.barycentric_source === 'applied-here' ? (row.barycentric_correction_km_s ?? 0) : 0;
  const toObserved = 1 / (1 + added / SPEED_OF_LIGHT_KM_S);
  const marks = (of: LineMark['of'], kind: Kind | null, redshift: number | null): LineMark[] => {
    if (kind === null || redshift === null) return [];
    const stretch = (1 + redshift) * toObserved;
    return LANDMARK_LINES.filter((line) => line.kinds.includes(kind))
      .map((line) => ({ label: line.label, wavelength: line.wavelength * stretch, of }))
      .filter((mark) => mark.wavelength >= from && mark.wavelength <= to)
      .map((mark) => ({ ...mark, wavelength: Math.round(mark.wavelength * 100) / 100 }));
  };
  return [
    ...marks('best', row.kind, row.redshift),
    ...marks('runner-up', row.runner_up_kind, row.runner_up_redshift),
  ];
}
