/** Values of the QUALITY images; 0 is good, others add up. */
export const QUALITY = { dead: 1, cosmicRay: 2, vignetted: 4 } as const;
