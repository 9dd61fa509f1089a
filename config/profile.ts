import { parse } from 'yaml';
import { z } from 'zod';

/** Where one array is: HDU by number or EXTNAME; column by name, or by 1-based number in a text; row of an image. */
const arraySchema = z.strictObject({
  hdu: z.union([z.number().int().min(0), z.string().min(1)]).optional(),
  column: z.union([z.string().min(1), z.number().int().min(1)]).optional(),
  row: z.number().int().min(0).optional(),
});

const armSchema = z.strictObject({
  name: z.string().default(''),
  flux: arraySchema,
  wavelength: arraySchema.optional(),
  wavelengthUnit: z.string().optional(),
  spread: arraySchema.optional(),
  spreadMeaning: z.enum(['error', 'variance', 'inverse-variance']).optional(),
  quality: z.array(arraySchema).default([]),
  qualityBadWhen: z.enum(['nonzero', 'zero']).default('nonzero'),
  sky: arraySchema.optional(),
  lineSpread: arraySchema.optional(),
  lineSpreadMeaning: z
    .enum([
      'sigma-pixel',
      'sigma-angstrom',
      'sigma-km-s',
      'fwhm-pixel',
      'fwhm-angstrom',
      'resolving-power',
      'resolution-matrix',
    ])
    .optional(),
});

const profileSchema = z.strictObject({
  name: z.string().min(1),
  form: z
    .enum(['row-stack', 'table-row-per-pixel', 'table-row-per-spectrum', 'image-one-spectrum', 'text'])
    .optional(),
  medium: z.enum(['vacuum', 'air']).optional(),
  frame: z.enum(['topocentric', 'geocentric', 'heliocentric', 'barycentric', 'unknown']).optional(),
  resolvingPower: z.number().min(20).max(1_000_000).optional(),
  site: z
    .strictObject({
      latitudeDeg: z.number().min(-90).max(90),
      longitudeEastDeg: z.number().min(-180).max(360),
      heightM: z.number().min(-500).max(9_000),
    })
    .optional(),
  arms: z.array(armSchema).min(1).optional(),
  targets: z
    .strictObject({
      hdu: z.union([z.number().int().min(0), z.string().min(1)]),
      name: z.string().optional(),
      ra: z.string().optional(),
      dec: z.string().optional(),
      fibre: z.string().optional(),
      role: z.string().optional(),
      targetClass: z.string().optional(),
      magnitude: z.string().optional(),
      magnitudeBand: z.string().optional(),
    })
    .optional(),
});

/** What a survey says about its files: every part overrides what would be recognised. */
export type InputProfile = z.infer<typeof profileSchema>;
/** Where one array is, in a profile. */
export type ProfileArray = z.infer<typeof arraySchema>;
/** One arm, in a profile. */
export type ProfileArm = z.infer<typeof armSchema>;

/** A profile that cannot be used. Wrong usage, never a bug; the caller turns it into its own kind of fault. */
export class ProfileFault extends Error {
  override readonly name = 'ProfileFault';
}

/**
 * Parse an input profile.
 *
 * @param text YAML (or JSON, which is YAML)
 * @param label what messages call the profile, e.g. its path
 * @returns the profile with defaults filled in
 * @throws ProfileFault naming the key that is wrong
 */
export function parseProfile(text: string, label: string): InputProfile {
  let value: unknown;
  try {
    // `maxAliasCount` keeps a small file from unfolding into a huge one.
    value = parse(text, { maxAliasCount: 20 });
  } catch (error) {
    const why = error instanceof Error ? error.message.split('\n')[0] : String(error);
    throw new ProfileFault(`${label}: the profile must be YAML: ${why}`, { cause: error });
  }
  const result = profileSchema.safeParse(value);
  if (result.success) return result.data;
  const issues = result.error.issues.map(
    ({ path, message }) => `${path.length === 0 ? 'the profile' : path.join('.')}: ${message}`,
  );
  throw new ProfileFault(`${label}: ${issues.join('; ')}`);
}
