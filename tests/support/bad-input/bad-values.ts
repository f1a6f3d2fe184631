/** JSON without quotes around it: what JavaScript's own writer would not send. */
export class RawJson {
  readonly text: string;

  constructor(text: string) {
    this.text = text;
  }
}

const STRINGS = {
  'an empty text': '',
  blanks: ' \t ',
  'a text of 100 kB': 'x'.repeat(100_000),
  'a NUL character': 'a\u0000b',
  'half of a surrogate pair': '\ud800',
  'text that runs backwards': '\u202eabc\u202c',
  'joined emoji': '👩‍👩‍👧‍👦'.repeat(40),
  'combining marks': `a${'\u0301'.repeat(500)}`,
  'digits of another script': '١٢٣',
  SQL: `'; DROP TABLE users; --`,
  markup: '<script>alert(1)</script>',
  'a way out of a folder': '../../../../etc/passwd',
  'the name of a prototype': '__proto__',
  'a day that does not exist': '2026-02-30',
  'a day far off': '9999-12-31',
  'a number too large': '1e999',
} as const;

/** Values that some field somewhere may trip over; whether one is refused is up to the field's contract. */
export const BAD_VALUES: Readonly<Record<string, unknown>> = {
  ...STRINGS,
  nothing: null,
  'yes or no': true,
  'an object': { a: 1 },
  'an object with a __proto__': new RawJson('{"__proto__":{"admin":true}}'),
  'a list': [[]],
  'a long list': Array.from({ length: 6000 }, () => 'x'),
  'minus one': -1,
  zero: 0,
  'a fraction': 0.1,
  'the smallest number': 5e-324,
  'the largest number': Number.MAX_VALUE,
  'the largest whole number': Number.MAX_SAFE_INTEGER,
  'the largest negative whole number': Number.MIN_SAFE_INTEGER,
  'a number past every number': new RawJson('1e999'),
};

/** The same for query strings, which carry text alone. 6 kB is what fits beside the headers. */
export const BAD_QUERY_VALUES: Readonly<Record<string, string>> = {
  ...STRINGS,
  'a text of 100 kB': 'x'.repeat(6000),
  'half of a surrogate pair': '\ufffd',
  'minus one': '-1',
  zero: '0',
  'a fraction': '0.1',
  'a large number': '9007199254740993',
  'not a number': 'NaN',
  'an id of nothing': '00000000-0000-4000-8000-00000000dead',
  'a cursor of JSON': Buffer.from('{"a":[]}').toString('base64url'),
  'a cursor of a list': Buffer.from('[null,{}]').toString('base64url'),
  'a cursor of numbers': Buffer.from('[-1,"x"]').toString('base64url'),
};

/** Parts of a path, written as they are sent. */
export const BAD_PATH_PARTS: Readonly<Record<string, string>> = {
  'a short text': 'x',
  'an id of nothing': '00000000-0000-4000-8000-00000000dead',
  'a NUL character': '%00',
  'a broken escape': '%E0%A4%A',
  'a slash': 'a%2Fb',
  'a way out of a folder': '..%2F..%2Fetc%2Fpasswd',
  'a text of 6 kB': 'x'.repeat(6000),
  emoji: encodeURIComponent('🪸'),
  'the name of a prototype': '__proto__',
};

/** JSON text of a value that may hold raw parts. */
export function jsonOf(value: unknown): string {
  const raws: string[] = [];
  const text = JSON.stringify(value, (_key, each: unknown) => {
    if (!(each instanceof RawJson)) return each;
    raws.push(each.text);
    return `\u0001raw ${raws.length - 1}\u0001`;
  });
  return text.replace(/"\\u0001raw (\d+)\\u0001"/g, (_, index: string) => raws[Number(index)] ?? 'null');
}
