import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  checkCharacter,
  formatPlugCode,
  isPlugCode,
  makePlugCode,
  parsePlugCode,
  PLUG_ALPHABET,
  plugUrl,
} from '../../../shared/domain/plug-code.ts';
import reference from '../../reference/check-characters.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const code = fc
  .infiniteStream(fc.nat({ max: PLUG_ALPHABET.length - 1 }))
  .map((numbers) => makePlugCode(() => numbers.next().value ?? 0));

describe('the check character', () => {
  // ISO 7064 MOD 37-2; G123498654321 -> H is a published example.
  it.each(reference.mod37_2)('of $body is $check', ({ body, check }) => {
    expect(checkCharacter(body)).toBe(check);
  });

  it.each(['ab', 'A B', 'A*', 'Ä'])('when the body is "%s", refuses', (body) => {
    expect(domainErrorOf(() => checkCharacter(body)).code).toBe('input.invalid');
  });

  it('catches every single wrong character', () => {
    fc.assert(
      fc.property(code, fc.nat({ max: 6 }), fc.constantFrom(...PLUG_ALPHABET), (right, place, character) => {
        const wrong = right.slice(0, place) + character + right.slice(place + 1);
        expect(isPlugCode(wrong)).toBe(wrong === right);
      }),
      { numRuns: 2000 },
    );
  });

  it('catches every swap of two neighbours', () => {
    fc.assert(
      fc.property(code, fc.nat({ max: 5 }), (right, place) => {
        const swapped = right.slice(0, place) + right.charAt(place + 1) + right.charAt(place) + right.slice(place + 2);
        expect(isPlugCode(swapped)).toBe(swapped === right);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('making codes', () => {
  it('draws seven characters of the alphabet that read back as themselves', () => {
    fc.assert(
      fc.property(code, (made) => {
        expect(made).toMatch(new RegExp(`^[${reference.alphabet}]{7}$`));
        expect(parsePlugCode(made)).toEqual({ code: made });
      }),
    );
  });

  it('when the check would be I, L, O, U or *, draws again', () => {
    const rejected = [...PLUG_ALPHABET]
      .map((last) => `00000${last}`)
      .find((body) => 'ILOU*'.includes(checkCharacter(body)));
    const draws = [...(rejected ?? ''), ...'000000'].map((character) => PLUG_ALPHABET.indexOf(character));

    const made = makePlugCode(() => draws.shift() ?? 0);

    expect(rejected).toBeDefined();
    expect(made.slice(0, 6)).toBe('000000');
  });

  it('when the random source is stuck on a body without a check, gives up instead of looping', () => {
    const stuck = [...PLUG_ALPHABET].findIndex((each) => 'ILOU*'.includes(checkCharacter(each.repeat(6))));
    expect(stuck).toBeGreaterThanOrEqual(0);
    expect(domainErrorOf(() => makePlugCode(() => stuck)).code).toBe('server.failed');
  });

  it('asks the source only for numbers below the size of the alphabet', () => {
    const asked: number[] = [];
    makePlugCode((maxExclusive) => {
      asked.push(maxExclusive);
      return asked.length % maxExclusive;
    });
    expect(new Set(asked)).toEqual(new Set([32]));
  });
});

describe('reading codes', () => {
  // '7Q2KX9' with its check, worked by the rule above.
  const right = `7Q2KX9${checkCharacter('7Q2KX9')}`;
  const zeroOne = `0010A0${checkCharacter('0010A0')}`;

  it.each([
    ['as stored', right],
    ['in small letters', right.toLowerCase()],
    ['as it is shown', formatPlugCode(right)],
    ['with spaces', ` ${[...right].join(' ')} `],
    ['with a long dash', `${right.slice(0, 3)}–${right.slice(3)}`],
    ['as the address of a label', `HTTPS://FARM.EXAMPLE.COM/P/${right}`],
    ['as a small address with a query', `https://farm.example.com:8443/p/${right.toLowerCase()}?from=label#top`],
    ['as an address with a path before', `http://localhost:3000/farm/p/${right}/`],
    ['with a line end, as a scanner types it', `${right}\r\n`],
  ])('takes one %s', (_, text) => {
    expect(parsePlugCode(text)).toEqual({ code: right });
  });

  it('reads O as 0 and I and L as 1', () => {
    const looksLike = zeroOne.replace(/0/g, 'o').replace(/1/, 'l');
    expect(parsePlugCode(zeroOne)).toEqual({ code: zeroOne });
    expect(parsePlugCode(looksLike)).toEqual({ code: zeroOne });
    expect(parsePlugCode(zeroOne.replace('1', 'I'))).toEqual({ code: zeroOne });
  });

  it.each([
    ['', 'empty'],
    ['  - ', 'empty'],
    ['https://farm.example.com/p/', 'empty'],
    ['7Q2', 'too_short'],
    ['7Q2KX9MM', 'too_long'],
    ['https://farm.example.com/orders/12', 'too_long'],
    ['7Q2K*9M', 'wrong_character'],
    ['7Q2K珊9M', 'wrong_character'],
  ])('when it is "%s", names the problem %s', (text, problem) => {
    expect(parsePlugCode(text)).toMatchObject({ problem });
  });

  it('when two neighbours are swapped, suggests the right code or nothing, never a wrong guess as certain', () => {
    fc.assert(
      fc.property(code, fc.nat({ max: 5 }), (made, place) => {
        const swapped = made.slice(0, place) + made.charAt(place + 1) + made.charAt(place) + made.slice(place + 2);
        fc.pre(swapped !== made);
        const parsed = parsePlugCode(swapped);
        expect(parsed).toMatchObject({ problem: 'wrong_check' });
        if ('suggestion' in parsed) expect(parsed.suggestion).toBe(made);
      }),
    );
  });

  it('when a U was read for a V, suggests the V', () => {
    const withV = [...PLUG_ALPHABET]
      .map((last) => `V0000${last}`)
      .find((body) => PLUG_ALPHABET.includes(checkCharacter(body)));
    const made = `${withV}${checkCharacter(withV ?? '')}`;
    expect(parsePlugCode(made.replace('V', 'U'))).toEqual({ problem: 'wrong_character', suggestion: made });
  });

  it('never throws, whatever is scanned', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 40 }), (text) => {
        const parsed = parsePlugCode(text);
        expect('code' in parsed ? isPlugCode(parsed.code) : parsed.problem.length > 0).toBe(true);
      }),
    );
  });
});

describe('writing codes', () => {
  it('shows three and four', () => {
    expect(formatPlugCode('7Q2KX9M')).toBe('7Q2-KX9M');
  });

  it.each(['https://farm.example.com', 'https://farm.example.com/', 'HTTPS://FARM.EXAMPLE.COM'])(
    'puts %s in capitals for the QR',
    (origin) => {
      expect(plugUrl(origin, '7Q2KX9M')).toBe('HTTPS://FARM.EXAMPLE.COM/P/7Q2KX9M');
    },
  );

  it('keeps to the alphanumeric set of ISO/IEC 18004', () => {
    expect(plugUrl('http://localhost:3000', '7Q2KX9M')).toMatch(/^[0-9A-Z $%*+\-./:]+$/);
  });
});
