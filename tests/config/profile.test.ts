import { describe, expect, it } from 'vitest';
import { parseProfile, ProfileFault } from '../../config/profile.ts';

function messageOf(text: string): string {
  try {
    parseProfile(text, 'p.yaml');
  } catch (error) {
    if (error instanceof ProfileFault) return error.message;
    throw error;
  }
  throw new Error('a ProfileFault must be thrown, got none');
}

describe('parseProfile', () => {
  it('fills in defaults and leaves the rest out', () => {
    expect(parseProfile('name: a\narms: [{ flux: { hdu: 1 } }]', 'p.yaml')).toEqual({
      name: 'a',
      arms: [{ name: '', flux: { hdu: 1 }, quality: [], qualityBadWhen: 'nonzero' }],
    });
  });

  it('names the key that is wrong, misspelt or missing', () => {
    expect(messageOf('name: a\nmedium: water')).toContain('medium:');
    expect(messageOf('name: a\nresolvingPower: -3')).toContain('resolvingPower:');
    expect(messageOf('name: a\nfluxx: 1')).toContain('fluxx');
    expect(messageOf('medium: air')).toContain('name:');
    expect(messageOf('name: a\narms: [{ flux: { hdu: -1 } }]')).toContain('arms.0.flux.hdu:');
  });

  it('refuses what is no YAML, and small files that unfold into huge ones', () => {
    expect(messageOf('name: [')).toContain('must be YAML');
    const layers = ['a: &a [x, x, x, x, x, x, x, x, x]'];
    for (const [inner, outer] of ['ab', 'bc', 'cd', 'de', 'ef', 'fg'].map((pair) => [pair[0]!, pair[1]!])) {
      layers.push(`${outer}: &${outer} [${Array.from({ length: 9 }, () => `*${inner}`).join(', ')}]`);
    }
    expect(messageOf(layers.join('\n'))).toContain('must be YAML');
  });
});
