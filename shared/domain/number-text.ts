/** A number as typed by a person: decimal comma or point, spaces between thousands. Null when it is none. */
export function numberFromText(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\s\u2009\u202f']/g, '')
    .replace('\u2212', '-');
  const dotted = plain.includes('.') ? plain.replace(/,(?=\d{3}(\D|$))/g, '') : plain.replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(dotted) ? Number(dotted) : null;
}
