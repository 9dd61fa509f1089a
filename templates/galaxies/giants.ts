/** A stage of stars that left the main sequence: where it lies and its share of their light at 5500 Å. */
export interface GiantStage {
  readonly temperature: number;
  readonly logGravity: number;
  readonly share: number;
}

const stage = (temperature: number, logGravity: number, share: number): GiantStage => ({
  temperature,
  logGravity,
  share,
});

/**
 * Light shares along the giant branches, by age of the population. Chosen by hand so that star counts of old
 * clusters and the colours of galaxies come out (sub-giants, red clump, branch, tip); no published table.
 */
export const GIANTS = {
  old: [
    stage(5600, 3.6, 0.12),
    stage(5200, 3.3, 0.13),
    stage(4850, 2.6, 0.33),
    stage(4500, 2.1, 0.2),
    stage(4150, 1.7, 0.11),
    stage(3800, 1.2, 0.06),
    stage(3500, 0.8, 0.035),
    stage(3300, 0.5, 0.015),
  ],
  intermediate: [
    stage(6000, 3.8, 0.12),
    stage(5200, 3.3, 0.1),
    stage(4900, 2.6, 0.38),
    stage(4550, 2.1, 0.2),
    stage(4200, 1.7, 0.1),
    stage(3800, 1.2, 0.05),
    stage(3500, 0.8, 0.03),
    stage(3300, 0.5, 0.02),
  ],
  clump: [
    stage(5200, 3, 0.25),
    stage(4950, 2.6, 0.45),
    stage(4500, 2, 0.15),
    stage(4000, 1.5, 0.07),
    stage(3600, 1, 0.05),
    stage(3300, 0.5, 0.03),
  ],
  young: [stage(5000, 2.5, 0.4), stage(4500, 2, 0.2), stage(4000, 1.6, 0.2), stage(3600, 1, 0.2)],
  metalPoor: [
    stage(6000, 3.8, 0.15),
    stage(5500, 3.4, 0.2),
    stage(5100, 2.8, 0.35),
    stage(4750, 2.2, 0.15),
    stage(4450, 1.8, 0.1),
    stage(4200, 1.5, 0.05),
  ],
} as const satisfies Record<string, readonly GiantStage[]>;
