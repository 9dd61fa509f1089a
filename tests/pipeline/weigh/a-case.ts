import type { Measurement, Refit } from '../../../pipeline/measure/index.ts';
import { refitPixels } from '../../../pipeline/measure/index.ts';
import type { Case, LineMeasurement } from '../../../pipeline/weigh/index.ts';
import type { Family, Kind } from '../../../templates/family.ts';

const N = 600;

/** A flat spectrum of 600 pixels from 3,600 to 9,590 Å with unit errors. */
export function somePixels() {
  const ones = new Float64Array(N).fill(1);
  const wavelengthVacuumAngstrom = Float64Array.from({ length: N }, (_, i) => 3600 + 10 * i);
  return refitPixels([{ wavelengthVacuumAngstrom, flux: ones, inverseVariance: ones, level: ones }], 0);
}

export function someFamily(kind: Kind, name = `${kind}-test`): Family {
  const grid = { lnStart: 8, step: 1e-4, length: 10 };
  return {
    name,
    kind,
    grid,
    componentGrid: grid,
    basis: [],
    redshiftMin: kind === 'star' ? -0.005 : 0,
    redshiftMax: kind === 'star' ? 0.005 : 2,
    refitSet: kind,
    componentsAt: () => [],
    multiplicativeOrder: 4,
    additiveOrder: -1,
    mismatch: 0.02,
  };
}

export function someMeasurement(kind: Kind, redshift: number, chiSquare: number): Measurement {
  const refit: Refit = {
    redshift,
    chiSquare,
    price: 0,
    active: [],
    activeIndices: [],
    model: new Float64Array(N),
    continuum: new Float64Array(N),
  };
  return { kind, family: someFamily(kind), redshift, sigmaKmS: 20, atEdge: false, refined: true, refit };
}

export function someLine(
  name: string,
  signalToNoise: number,
  observed = 7000,
  flux = signalToNoise,
): LineMeasurement {
  return {
    name,
    wavelengthRestVacuumAngstrom: observed / 1.3,
    wavelengthObservedAngstrom: observed,
    flux,
    fluxError: flux / signalToNoise,
    equivalentWidthAngstrom: 10,
    signalToNoise,
  };
}

/** A bright, secure galaxy at z = 0.3 that deserves no reason at all; override what a test is about. */
export function aCase(changes: Partial<Case> = {}): Case {
  const best = { best: someMeasurement('galaxy', 0.3, 600), cost: 617, probability: 1 };
  const runnerUp = { best: someMeasurement('galaxy', 0.8, 900), cost: 917, probability: 0 };
  return {
    measured: { pixels: somePixels(), measurements: [best.best], emptyChiSquare: 5_000, emptyFreedom: 8 },
    posterior: {
      hypotheses: [best, runnerUp],
      probabilityNone: 0,
      byKind: { galaxy: 1, quasar: 0, star: 0 },
    },
    best,
    runnerUp,
    margin: 300,
    marginOverNone: 4_000,
    reducedChiSquare: 1,
    degreesOfFreedom: 590,
    lines: [someLine('[O II] 3728', 9, 4847), someLine('[O III] 5008', 20, 6511), someLine('Hα', 15, 8534)],
    secondOpinion: { redshift: 0.3, r: 9, heightAtAnswer: 0.6, rAtAnswer: 9 },
    signalToNoisePerAngstrom: 12,
    goodFraction: 0.98,
    noiseFactor: 1,
    noiseCorrelation: [0],
    noiseEstimated: false,
    frame: 'barycentric',
    lineSpreadSigmaKmS: 65,
    lineSpreadStated: true,
    ...changes,
  };
}
