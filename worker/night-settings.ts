import { z } from 'zod';
import { MEASURING_OPTIONS, type MeasuringOptions } from '../config/measuring.ts';
import { type OptionDescription, type OptionValue, readOption } from '../config/option.ts';
import type { Json, NightRecord } from '../store/index.ts';
import { familyFilesHash, familyFolder, recipeHash, recipeOf } from './recipe.ts';

/** What a night was queued with; any worker must be able to take it up from the store alone. */
export interface NightSettings {
  readonly measuring: MeasuringOptions;
  /** The input profile as parsed; null when layouts are recognised. */
  readonly profile: Json;
}

const settingsShape = z.object({
  measuring: z.record(z.string(), z.unknown()),
  profile: z.json().nullable(),
});

/** Checks every option again: the store may have been written by another version. */
export function settingsOf(night: NightRecord): NightSettings {
  const { measuring, profile } = settingsShape.parse(night.settings);
  const values = Object.entries(MEASURING_OPTIONS).map(([name, description]): [string, OptionValue] => {
    const given = measuring[name];
    const known: OptionDescription<OptionValue> = description;
    return [name, given === undefined ? known.default : readOption(name, known, given)];
  });
  return { measuring: Object.fromEntries(values) as unknown as MeasuringOptions, profile };
}

/** The recipe hash of these settings with the families installed here. */
export function recipeHashOf(settings: NightSettings): string {
  return recipeHash(recipeOf(settings.measuring, settings.profile, familyFilesHash(familyFolder())));
}
