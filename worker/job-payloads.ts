import { z } from 'zod';

/**
 * What travels through the queue: references to the store, never spectra, paths or results. The queue is an
 * input like any other, so a worker checks each payload against these schemas before it acts.
 */

const identifier = z.string().min(1).max(512);
const hash = z.string().regex(/^[0-9a-f]{64}$/);

const range = z.strictObject({
  inputId: identifier,
  first: z.int().min(0),
  count: z.int().min(1).max(100_000),
});

const base = { night: identifier, recipeHash: hash, runId: identifier };

export const exposurePayload = z.strictObject({ ...base, exposureKey: identifier });
export const chunkPayload = z.strictObject({
  ...base,
  exposureKey: identifier.nullable(),
  ranges: z.array(range).min(1).max(10_000),
});
export const nightPayload = z.strictObject(base);

export type ExposurePayload = z.infer<typeof exposurePayload>;
export type ChunkPayload = z.infer<typeof chunkPayload>;
export type NightPayload = z.infer<typeof nightPayload>;

/** A job before it is on the queue. */
export type JobOrder =
  | { readonly kind: 'exposure'; readonly payload: ExposurePayload }
  | { readonly kind: 'chunk'; readonly payload: ChunkPayload }
  | { readonly kind: 'night'; readonly payload: NightPayload };
