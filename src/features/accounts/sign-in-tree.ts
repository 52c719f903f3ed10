export type Season = 'spring' | 'summer' | 'autumn' | 'winter';

/** A pair of branches on one wire: its height, how far it reaches to either side, how thick it has grown. */
export type Tier = { y: number; reach: number; thickness: number };

export const tiers: Tier[] = [
  { y: 440, reach: 240, thickness: 7 },
  { y: 320, reach: 226, thickness: 6 },
  { y: 200, reach: 192, thickness: 5 },
  { y: 80, reach: 124, thickness: 4 },
];

/** The seasons of a northern garden by whole months (1 to 12). */
export function seasonOf(month: number): Season {
  if (month >= 3 && month <= 5) return 'spring';
  if (month >= 6 && month <= 8) return 'summer';
  if (month >= 9 && month <= 11) return 'autumn';
  return 'winter';
}

export type Dressing = {
  kind: 'leaf' | 'blossom' | 'fruit' | 'bud';
  /** Distance from the trunk. */
  along: number;
  up: boolean;
  scale: number;
  opacity: number;
};

const firstAlong = 56;
const step = 17;
const opacities = [1, 0.85, 0.7];

/**
 * What hangs on one branch in one season, from the trunk outward, above and below in turn. It is the same on
 * every visit: a picture that changes by itself would draw the eye from the form beside it.
 */
export function dressingOf(tier: Tier, side: -1 | 1, season: Season): Dressing[] {
  const places = Math.floor((tier.reach - firstAlong) / step) + 1;
  const dressings: Dressing[] = [];
  for (let place = 0; place < places; place += 1) {
    const along = firstAlong + place * step;
    const up = (place + (side === 1 ? 1 : 0)) % 2 === 0;
    const opacity = opacities[(place + tier.thickness) % opacities.length] ?? 1;
    const everyFourth = (place + tier.thickness + (side === 1 ? 2 : 0)) % 4;
    const at = { along, up, scale: 1, opacity };
    if (season === 'winter') dressings.push({ ...at, kind: 'bud' });
    else if (season === 'summer') dressings.push({ ...at, kind: 'leaf' });
    else if (season === 'spring') {
      if (everyFourth === 0 || everyFourth === 3) dressings.push({ ...at, kind: 'blossom' });
      else dressings.push({ ...at, kind: 'leaf', scale: 0.7 });
    } else {
      dressings.push({ ...at, kind: 'leaf' });
    }
  }
  // Fruit hangs below the branch, under every fourth leaf that stands above it.
  if (season === 'autumn') {
    const above = dressings.filter(({ up }) => up);
    above.forEach((leaf, index) => {
      if (index % 2 === 1) dressings.push({ ...leaf, kind: 'fruit', up: false });
    });
  }
  return dressings;
}
