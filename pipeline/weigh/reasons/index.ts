import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';
import { poorFit, rangeEdge, unusual } from './fit-quality.ts';
import { frameUnknown, tooSharp, wrongNoise } from './input.ts';
import { gaps, impossibleLines, loneLine, skyLine } from './line-evidence.ts';
import { methodsDisagree, rival } from './rivals.ts';
import { faint, noLight } from './signal.ts';

/** Every reason that applies, the weightiest first. */
export function reasonsFor(one: Case, confidence: number, reviewConfidence: number): Reason[] {
  const found = [
    noLight(one),
    faint(one, confidence, reviewConfidence),
    rival(one, confidence, reviewConfidence),
    loneLine(one),
    methodsDisagree(one, confidence, reviewConfidence),
    poorFit(one),
    gaps(one, confidence, reviewConfidence),
    rangeEdge(one),
    skyLine(one),
    impossibleLines(one),
    unusual(one),
    wrongNoise(one),
    frameUnknown(one),
    tooSharp(one),
  ].filter((reason) => reason !== null);
  const order = { blocks: 0, look: 1, note: 2 };
  return found.sort((a, b) => order[a.weight] - order[b.weight]);
}
