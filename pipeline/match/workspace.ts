/** Scratch arrays kept between calls, so that measuring a night allocates once. Not to be shared by two calls at once. */
export interface MatchWorkspace {
  readonly arrays: Map<string, Float64Array>;
}

/** A new, empty workspace: one per thread. */
export function createMatchWorkspace(): MatchWorkspace {
  return { arrays: new Map() };
}

/** An array of at least `length` samples, its content undefined; the same array whenever the name is the same. */
export function scratch(workspace: MatchWorkspace, name: string, length: number): Float64Array {
  const known = workspace.arrays.get(name);
  if (known !== undefined && known.length >= length) return known;
  const fresh = new Float64Array(length);
  workspace.arrays.set(name, fresh);
  return fresh;
}

/** Like `scratch`, but exactly `length` long and filled with zeros. */
export function zeroed(workspace: MatchWorkspace, name: string, length: number): Float64Array {
  return scratch(workspace, name, length).subarray(0, length).fill(0);
}
