import { expect, it } from 'vitest';
import { observingNight } from '../../worker/night-name.ts';

// Expected dates worked out by hand from the definition: the local mean solar date of the noon before.
it.each([
  ['an evening east of Greenwich', '2031-04-02T18:00:00Z', 149, '2031-04-02'],
  ['a night that passes midnight UTC in the west', '2031-04-03T03:30:00Z', -59.3, '2031-04-02'],
  ['the morning end of the same night', '2031-04-03T10:00:00', -59.3, '2031-04-02'],
  ['the afternoon after it', '2031-04-03T17:00:00Z', -59.3, '2031-04-03'],
])('observingNight() gives one name to %s', (_title, observedAt, longitude, night) => {
  expect(observingNight(observedAt, longitude)).toBe(night);
});

it('observingNight() says nothing about a time it cannot read', () => {
  expect(observingNight('last tuesday', 0)).toBeNull();
});
