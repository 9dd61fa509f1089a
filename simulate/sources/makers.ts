import type { RandomStream } from '../../pipeline/core/random.ts';
import type { StarGrid } from '../../templates/prepare/star-grid.ts';
import { galaxyMaker, type GalaxyMaker } from './galaxy-maker.ts';
import { drawQuasar } from './quasar-maker.ts';
import type { Source } from './source.ts';
import { starMaker, type StarMaker } from './star-maker.ts';

/** Everything a field can be filled with. */
export interface Makers {
  readonly stars: StarMaker;
  readonly galaxies: GalaxyMaker;
  drawQuasar(random: RandomStream): Source;
}

/** Prepares the makers; mixing the populations takes a few seconds. */
export function makersFrom(stars: StarGrid): Makers {
  return { stars: starMaker(stars), galaxies: galaxyMaker(stars), drawQuasar };
}
