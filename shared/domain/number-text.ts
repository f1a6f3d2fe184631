/** A number as typed by a person: decimal comma or point, spaces between thousands. Null when it is none. */
export function numberFromText(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\s\u2009\u202f']/g, '')
    .replace('\u2212', '-');
  const dotted = plain.includes('.') ? plain.replace(/,(?=\d{3}(\D|$))/g, '') : plain.replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(dotted) ? Number(dotted) : null;
}

/** Which mark stands before the decimals in a file; the other one may group thousands. */
export type DecimalMark = 'point' | 'comma';

/** A number as a file writes it, where it is known which mark it uses. Null when it is none. */
export function numberFromFile(text: string, mark: DecimalMark): number | null {
  const grouped = mark === 'point' ? /,(?=\d{3}(\D|$))/g : /\.(?=\d{3}(\D|$))/g;
  const plain = text.replace(grouped, '');
  return numberFromText(mark === 'comma' ? plain.replace(',', '.') : plain);
}
