import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makePlugCode, plugUrl } from '../../../shared/domain/plug-code.ts';
import {
  boxCode,
  boxUrl,
  explainProblem,
  orderOfBox,
  rackUrl,
  readScan,
  tankUrl,
} from '../../../shared/domain/scan-text.ts';

const plug = makePlugCode((max) => 17 % max);
const racks = new Set(['R7', 'A-12', '0000000']);
const isRack = (code: string) => racks.has(code);

describe('readScan', () => {
  it.each([
    [plug, { kind: 'plug', code: plug }],
    [plug.toLowerCase(), { kind: 'plug', code: plug }],
    [` ${plug.slice(0, 3)}-${plug.slice(3)}\n`, { kind: 'plug', code: plug }],
    [`HTTPS://FARM.EXAMPLE.COM/P/${plug}`, { kind: 'plug', code: plug }],
    [`https://farm.example.com/p/${plug.toLowerCase()}?from=camera`, { kind: 'plug', code: plug }],
    ['HTTPS://FARM.EXAMPLE.COM/R/R7', { kind: 'rack', code: 'R7' }],
    ['https://farm.example.com/r/new-rack', { kind: 'rack', code: 'NEW-RACK' }],
    ['HTTPS://FARM.EXAMPLE.COM/T/T-4', { kind: 'tank', code: 'T-4' }],
    ['https://farm.example.com/b/1042-1', { kind: 'box', code: '1042-1' }],
    ['r7', { kind: 'rack', code: 'R7' }],
    ['a-12', { kind: 'rack', code: 'A-12' }],
  ])('when the text is %j, reads %j', (text, reading) => {
    expect(readScan(text, isRack)).toEqual(reading);
  });

  it.each([
    ['', 'empty'],
    ['R8', 'too_short'],
    ['978020137962', 'too_long'],
    ['https://example.com/shop', 'too_long'],
  ])('when the text is %j, the problem is %s', (text, problem) => {
    expect(readScan(text, isRack)).toMatchObject({ kind: 'unknown', text, problem });
  });

  it('when two characters were swapped, tells the one near code that is right', () => {
    expect(readScan('JTD-DA1W', isRack)).toEqual({
      kind: 'unknown',
      text: 'JTD-DA1W',
      problem: 'wrong_check',
      suggestion: 'TJDDA1W',
    });
  });

  it('whatever the origin, what a label holds is read back as what it was printed for', () => {
    fc.assert(
      fc.property(fc.webAuthority(), fc.integer({ min: 0, max: 1e9 }), (authority, seed) => {
        let state = seed;
        const code = makePlugCode((max) => (state = (state * 48271 + 11) % 2147483647) % max);
        fc.pre(!/\/[pr]\//i.test(authority));

        expect(readScan(plugUrl(`https://${authority}/`, code), isRack)).toEqual({ kind: 'plug', code });
        expect(readScan(rackUrl(`https://${authority}`, 'B-3'), isRack)).toEqual({ kind: 'rack', code: 'B-3' });
      }),
    );
  });

  it('whatever is scanned, answers and never throws', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (text) => {
        expect(['plug', 'rack', 'unknown']).toContain(readScan(text, isRack).kind);
      }),
    );
  });
});

describe('explainProblem', () => {
  it.each(['empty', 'too_short', 'too_long', 'wrong_character', 'wrong_check'] as const)(
    'when the problem is %s, says so in a sentence',
    (problem) => {
      expect(explainProblem(problem)).toMatch(/^[A-Z].+\.$/);
    },
  );
});

describe('codes of boxes', () => {
  it('when a label of a box or a tank is read, it leads back to its order or its tank', () => {
    const box = readScan(boxUrl('http://localhost:3000/', boxCode(1042, 3)), isRack);
    expect(box).toEqual({ kind: 'box', code: '1042-3' });
    expect(orderOfBox('1042-3')).toBe(1042);
    expect(readScan(tankUrl('http://localhost:3000', 'nursery-2'), isRack)).toEqual({
      kind: 'tank',
      code: 'NURSERY-2',
    });
  });

  it.each(['', '1042', '1042-', '-1', 'R-1', '1042-1-1', '12345678901-1'])(
    'when it is "%s", is no code of a box',
    (code) => {
      expect(orderOfBox(code)).toBeNull();
    },
  );
});
