/** What an object is. */
export type Kind = 'galaxy' | 'quasar' | 'star';
export const KINDS: readonly Kind[] = ['galaxy', 'quasar', 'star'];

/** Uniform grid in ln(wavelength): pixel i is centred at exp(lnStart + i*step) vacuum ångström, rest frame. */
export interface LogGrid {
  readonly lnStart: number;
  readonly step: number;
  readonly length: number;
}

/** What a physical component stands for; the refit charges and bounds them by role. */
export type ComponentRole = 'continuum' | 'narrow-line' | 'broad-line' | 'host' | 'iron' | 'balmer-continuum';

/** One non-negative spectrum of the physical refit. Flux density per ångström, any positive scale. */
export interface Component {
  readonly label: string;
  readonly role: ComponentRole;
  /**
   * Line group this belongs to (`balmer`, `oxygen2`, ...), the same name for its narrow and wide versions;
   * empty for continua.
   */
  readonly group: string;
  /** On the family's component grid, at the line spread the family was prepared for. */
  readonly flux: Float32Array;
  /** First and one-past-last pixel where |flux| > 0: lines are short, loops need not run over zeros. */
  readonly first: number;
  readonly end: number;
}

/**
 * A template family: spectra that shift together, broadened to one instrument's line spread.
 * `basis` serves the search (free signs); `componentsAt` serves the non-negative refit.
 */
export interface Family {
  /** Lower-case words joined by hyphens, e.g. `star-fg`, `galaxy-narrow`, `quasar-2.3`. */
  readonly name: string;
  readonly kind: Kind;
  readonly grid: LogGrid;
  /** The finer grid of the components, for the refit on native pixels. */
  readonly componentGrid: LogGrid;
  /** K rows on `grid`, unit rms; K is 2..10. */
  readonly basis: readonly Float32Array[];
  readonly redshiftMin: number;
  readonly redshiftMax: number;
  /** Families of one refit set share their components: refit a redshift once per set. */
  readonly refitSet: string;
  /** Components of the refit at a redshift (quasars: intergalactic absorption changes with it). Cached inside. */
  componentsAt(redshift: number): readonly Component[];
  /** Order of the multiplicative Legendre polynomial of the refit. */
  readonly multiplicativeOrder: number;
  /** Order of the additive Legendre polynomial of the refit; -1 = none. */
  readonly additiveOrder: number;
  /** Relative mismatch between the best template of this family and real objects, 1-sigma, of the local flux. */
  readonly mismatch: number;
}
