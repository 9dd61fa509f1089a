import type { Answer, Curves } from '../../pipeline/index.ts';

/** An answer with every field filled, so that a field the store forgets shows. */
export function fabricatedAnswer(changes: Partial<Answer> = {}): Answer {
  return {
    kind: 'galaxy',
    family: 'galaxy-narrow',
    redshift: 0.123456789,
    redshiftError: 1.5e-5,
    velocityKmS: null,
    velocityErrorKmS: null,
    confidence: 0.97,
    confidenceWithoutPrior: 0.95,
    probabilityGalaxy: 0.98,
    probabilityQuasar: 0.01,
    probabilityStar: 0.005,
    probabilityNone: 0.005,
    needsReview: false,
    reasons: [],
    runnerUpRedshift: 0.4,
    runnerUpKind: 'quasar',
    runnerUpConfidence: 0.01,
    correlationPeak: 0.8,
    correlationR: 9.5,
    chiSquare: 1234.5,
    degreesOfFreedom: 1200,
    chiSquareMargin: 88,
    signalToNoisePerAngstrom: 5.5,
    goodFraction: 0.99,
    noiseFactor: 1.1,
    noiseCorrelation: 0.2,
    linesDetected: 6,
    strongestLineSnr: 40,
    barycentricCorrectionKmS: -12.5,
    barycentricSource: 'applied-here',
    calibrationId: 'fabricated-1',
    candidates: [
      {
        kind: 'galaxy',
        family: 'galaxy-narrow',
        redshift: 0.123456789,
        redshiftError: 1.5e-5,
        chiSquare: 1234.5,
        degreesOfFreedom: 1200,
        probability: 0.97,
        correlationPeak: 0.8,
        correlationR: 9.5,
      },
    ],
    lines: [],
    features: { margin: 88 },
    ...changes,
  };
}

/** Curves of one short arm. */
export function fabricatedCurves(): Curves {
  const n = 64;
  const wave = (scale: number) => Float32Array.from({ length: n }, (_, i) => 10 + scale * Math.sin(i / 5));
  return {
    arms: [
      {
        name: 'blue',
        wavelengthVacuumAngstrom: Float32Array.from({ length: n }, (_, i) => 4_000 + 1.25 * i),
        flux: wave(3),
        error: new Float32Array(n).fill(0.5),
        used: new Uint8Array(n).fill(1),
        model: wave(2.9),
        runnerUpModel: new Float32Array(0),
      },
    ],
    scan: [{ kind: 'galaxy', redshift: wave(0.01), chiSquare: wave(4) }],
  };
}
