import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { glyphOf, type Glyph } from '../../../shared/domain/glyph.ts';

const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ';
const letters = fc.constantFrom(...LETTERS);
const lineCode = fc.tuple(letters, letters, letters).map((each) => each.join(''));

function hueDistance(a: Glyph, b: Glyph): number {
  const apart = Math.abs(a.hue - b.hue) % 360;
  return Math.min(apart, 360 - apart);
}

function differingFeatures(a: Glyph, b: Glyph): number {
  const names = ['corallites', 'septa', 'reach', 'turn'] as const;
  return names.filter((name) => a.features[name] !== b.features[name]).length;
}

describe('the glyph of a line', () => {
  it('is always the same, whatever the case', () => {
    expect(glyphOf('WIG')).toEqual(glyphOf('WIG'));
    expect(glyphOf(' wig ')).toEqual(glyphOf('WIG'));
  });

  it('has 1, 3, 4 or 7 corallites, each with its septa', () => {
    fc.assert(
      fc.property(lineCode, (code) => {
        const { corallites, features } = glyphOf(code);
        expect([1, 3, 4, 7]).toContain(corallites.length);
        expect(corallites).toHaveLength(features.corallites);
        expect(corallites.every(({ septa }) => septa.length === features.septa)).toBe(true);
      }),
    );
  });

  it('stays in its box with the width of the pen, for any code', () => {
    fc.assert(
      fc.property(fc.oneof(lineCode, fc.string({ unit: 'binary', maxLength: 12 })), (code) => {
        const { corallites, hue, stroke } = glyphOf(code);
        expect(Number.isInteger(hue) && hue >= 0 && hue < 360).toBe(true);
        for (const { cx, cy, radius } of corallites) {
          for (const edge of [cx - radius, cy - radius]) expect(edge).toBeGreaterThanOrEqual(stroke / 2);
          for (const edge of [cx + radius, cy + radius]) expect(edge).toBeLessThanOrEqual(100 - stroke / 2);
        }
      }),
    );
  });

  it('draws septa from the wall inward, none through the middle', () => {
    fc.assert(
      fc.property(lineCode, (code) => {
        for (const { cx, cy, radius, septa } of glyphOf(code).corallites) {
          for (const { x1, y1, x2, y2 } of septa) {
            expect(Math.hypot(x1 - cx, y1 - cy)).toBeCloseTo(radius, 1);
            expect(Math.hypot(x2 - cx, y2 - cy)).toBeGreaterThan(0.1 * radius);
            expect(Math.hypot(x2 - cx, y2 - cy)).toBeLessThan(0.7 * radius);
          }
        }
      }),
    );
  });

  it('lets no two corallites overlap', () => {
    fc.assert(
      fc.property(lineCode, (code) => {
        const { corallites } = glyphOf(code);
        corallites.forEach((a, index) => {
          for (const b of corallites.slice(index + 1)) {
            expect(Math.hypot(a.cx - b.cx, a.cy - b.cy)).toBeGreaterThanOrEqual(a.radius + b.radius);
          }
        });
      }),
    );
  });
});

describe('glyphs of near codes', () => {
  it('with one letter changed differ in two features or more', () => {
    fc.assert(
      fc.property(lineCode, fc.nat({ max: 2 }), letters, (code, place, letter) => {
        const near = code.slice(0, place) + letter + code.slice(place + 1);
        fc.pre(near !== code);
        expect(differingFeatures(glyphOf(code), glyphOf(near))).toBeGreaterThanOrEqual(2);
      }),
      { numRuns: 500 },
    );
  });

  it('with two neighbours swapped differ in two features or more', () => {
    fc.assert(
      fc.property(lineCode, fc.nat({ max: 1 }), (code, place) => {
        const near = code.slice(0, place) + code.charAt(place + 1) + code.charAt(place) + code.slice(place + 2);
        fc.pre(near !== code);
        expect(differingFeatures(glyphOf(code), glyphOf(near))).toBeGreaterThanOrEqual(2);
      }),
      { numRuns: 500 },
    );
  });

  it('with a digit at the end differ in two features or in hue by 25°', () => {
    const ending = fc.constantFrom(...`0123456789${LETTERS}`);
    fc.assert(
      fc.property(lineCode, ending, ending, (code, a, b) => {
        fc.pre(a !== b);
        const [one, other] = [glyphOf(code + a), glyphOf(code + b)];
        expect(differingFeatures(one, other) >= 2 || hueDistance(one, other) >= 25).toBe(true);
      }),
      { numRuns: 500 },
    );
  });

  it('use every choice and the whole wheel of hues about evenly', () => {
    const glyphs = [...LETTERS].flatMap((a) => [...LETTERS].map((b) => glyphOf(`${a}${b}K`)));
    const share = (test: (glyph: Glyph) => boolean) => glyphs.filter(test).length / glyphs.length;
    for (const count of [1, 3, 4, 7])
      expect(share(({ features }) => features.corallites === count)).toBeGreaterThan(0.2);
    for (const count of [5, 6, 7, 9, 12])
      expect(share(({ features }) => features.septa === count)).toBeGreaterThan(0.15);
    for (let from = 0; from < 360; from += 60) {
      expect(share(({ hue }) => hue >= from && hue < from + 60)).toBeGreaterThan(0.12);
    }
  });
});
