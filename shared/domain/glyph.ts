/** A wall of a corallite and its septa, in a box of 0 to 100 each way. */
export interface Corallite {
  cx: number;
  cy: number;
  radius: number;
  septa: { x1: number; y1: number; x2: number; y2: number }[];
}

/** The drawing that stands for a line where it has no photo. */
export interface Glyph {
  /** Degrees on the colour wheel; the client sets lightness and strength for its theme. */
  hue: number;
  /** Width of the pen in the box's units. */
  stroke: number;
  corallites: Corallite[];
  features: GlyphFeatures;
}

/** The choices that a code makes; two glyphs with equal features have equal lines. */
export interface GlyphFeatures {
  corallites: number;
  septa: number;
  /** Length of a septum as a part of the radius. */
  reach: number;
  /** Turn of the septa as a part of the angle between two. */
  turn: number;
}

const COUNTS = [7, 3, 4, 1] as const;
const SEPTA = [6, 9, 5, 12, 7] as const;
const REACHES = [0.4, 0.62, 0.82] as const;
const TURNS = 7;

/**
 * Multipliers by place of a character. Within one list neighbours differ and none shares a factor with the number of
 * choices, and the numbers of choices (4, 5, 3, 7) share none with each other. So a changed letter or a swap of two
 * neighbours can leave at most two of the four features as they were.
 */
const PLACE_WEIGHTS = { corallites: [1, 3], septa: [1, 2, 4, 3], reach: [1, 2], turn: [1, 3, 2, 6, 4, 5] } as const;

/** The angle that spreads any run of whole numbers best over the wheel. */
const GOLDEN_ANGLE = 137.50776405;

/**
 * The glyph of a line, always the same for the same code and plainly another for a near one.
 *
 * @param code the line's code, such as 'WIG'; case does not matter
 */
export function glyphOf(code: string): Glyph {
  const values = [...code.trim().toUpperCase()].map(characterValue);
  const features: GlyphFeatures = {
    corallites: pick(COUNTS, mix(values, PLACE_WEIGHTS.corallites)),
    septa: pick(SEPTA, mix(values, PLACE_WEIGHTS.septa)),
    reach: pick(REACHES, mix(values, PLACE_WEIGHTS.reach)),
    turn: (mix(values, PLACE_WEIGHTS.turn) % TURNS) / TURNS,
  };
  return { hue: hueOf(values), stroke: strokeOf(features), corallites: rosette(features), features };
}

function hueOf(values: readonly number[]): number {
  const number = values.reduce((sum, value) => (sum * 37 + value + 1) % 1_000_003, 0);
  return Math.round((number * GOLDEN_ANGLE) % 360) % 360;
}

/** Many small corallites need a finer pen. */
function strokeOf({ corallites }: GlyphFeatures): number {
  return corallites === 1 ? 6 : corallites === 7 ? 3 : 4;
}

function rosette(features: GlyphFeatures): Corallite[] {
  return centresOf(features.corallites).map(([cx, cy, radius]) => ({
    ...{ cx: rounded(cx), cy: rounded(cy), radius },
    septa: septaOf(cx, cy, radius, features),
  }));
}

function centresOf(count: number): [cx: number, cy: number, radius: number][] {
  if (count === 1) return [[50, 50, 42]];
  if (count === 7) return [[50, 50, 15], ...ring(6, 30.5, 15)];
  // Three sit lower, so that the drawing as a whole is in the middle of the box.
  return count === 3 ? ring(3, 25, 21, 56) : ring(4, 27, 18);
}

function ring(count: number, distance: number, radius: number, middleY = 50): [number, number, number][] {
  return Array.from({ length: count }, (_, index) => {
    const angle = (2 * Math.PI * index) / count - Math.PI / (count === 4 ? 4 : 2);
    return [50 + distance * Math.cos(angle), middleY + distance * Math.sin(angle), radius];
  });
}

function septaOf(cx: number, cy: number, radius: number, { septa, reach, turn }: GlyphFeatures): Corallite['septa'] {
  return Array.from({ length: septa }, (_, index) => {
    const angle = (2 * Math.PI * (index + turn)) / septa;
    const [dx, dy] = [Math.cos(angle) * radius, Math.sin(angle) * radius];
    const inner = 1 - reach;
    return {
      ...{ x1: rounded(cx + dx), y1: rounded(cy + dy) },
      ...{ x2: rounded(cx + dx * inner), y2: rounded(cy + dy * inner) },
    };
  });
}

function mix(values: readonly number[], weights: readonly number[]): number {
  return values.reduce((sum, value, place) => sum + value * (weights[place % weights.length] ?? 1), 0);
}

function pick<Choice>(choices: readonly [Choice, ...Choice[]], number: number): Choice {
  return choices[number % choices.length] ?? choices[0];
}

/** 0–9 and A–Z by their place; anything else by its code point, so that no code is without a glyph. */
function characterValue(character: string): number {
  const value = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ'.indexOf(character);
  return value >= 0 ? value : (character.codePointAt(0) ?? 0);
}

function rounded(value: number): number {
  return Math.round(value * 100) / 100;
}
