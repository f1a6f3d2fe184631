import fc from 'fast-check';
import QRCode from 'qrcode';
import { describe, expect, it } from 'vitest';
import { type LabelContent, layoutLabel, monoWidth } from '../../../shared/domain/label-layout.ts';
import { LABEL_SHEETS } from '../../../shared/domain/label-sheets.ts';
import { plugUrl } from '../../../shared/domain/plug-code.ts';
import { qrRuns } from '../../../shared/domain/qr-runs.ts';
import reference from '../../reference/labels.json' with { type: 'json' };

const label: LabelContent = {
  ...{ qrText: 'HTTPS://FARM.EXAMPLE.COM/P/7Q2KX9M', code: '7Q2-KX9M', glyphCode: 'WIG' },
  rows: ['WIG 4831', 'cut 2026-02-26', 'WIG-2609-1'],
};

describe.each(LABEL_SHEETS)('a label of stock $id', (sheet) => {
  it.each([25, 29])('when the code has %i modules, everything lies inside the label', (modules) => {
    const { qr, glyph, texts } = layoutLabel(sheet, label, modules);

    const boxes = [
      { x: qr.x, y: qr.y, width: qr.side, height: qr.side },
      ...(glyph ? [{ x: glyph.x, y: glyph.y, width: glyph.side, height: glyph.side }] : []),
      ...texts.map(({ text, x, y, size, anchor }) => {
        const width = monoWidth(text, size);
        return { x: anchor === 'middle' ? x - width / 2 : x, y: y - size * 0.72, width, height: size * 0.72 };
      }),
    ];
    for (const box of boxes) {
      for (const [x, y] of [
        [box.x, box.y],
        [box.x + box.width, box.y],
        [box.x, box.y + box.height],
        [box.x + box.width, box.y + box.height],
      ] as const) {
        const inside =
          sheet.shape === 'round'
            ? Math.hypot(x - sheet.width / 2, y - sheet.height / 2) <= sheet.width / 2
            : x >= -1e-9 && y >= -1e-9 && x <= sheet.width + 1e-9 && y <= sheet.height + 1e-9;
        expect(inside).toBe(true);
      }
    }
  });

  it('when laid out, no word stands in the quiet zone', () => {
    const { qr, texts } = layoutLabel(sheet, label, 25);

    for (const { text, x, y, size, anchor } of texts) {
      const width = monoWidth(text, size);
      const left = anchor === 'middle' ? x - width / 2 : x;
      const clear =
        left >= qr.x + qr.side - 1e-9 ||
        left + width <= qr.x ||
        y - size * 0.72 >= qr.y + qr.side - 0.2 ||
        y <= qr.y + 1e-9;
      expect(clear).toBe(true);
    }
  });

  it('when laid out, shows the code in letters and keeps four light modules around the QR code', () => {
    const { qr, texts } = layoutLabel(sheet, label, 25);

    expect(texts.map(({ text }) => text)).toContain('7Q2-KX9M');
    expect(qr.quiet).toBeCloseTo(4 * qr.module, 9);
    expect(33 * qr.module).toBeCloseTo(qr.side, 9);
    // Two dots of a 203 dpi printer, the coarsest in use for labels (common practice, no source).
    expect(qr.module).toBeGreaterThan(0.25);
  });
});

describe('a label of an own size', () => {
  const side = fc.double({ min: 8, max: 120, noNaN: true });

  it('whatever its sides, code and words lie inside of it and clear of the quiet zone', () => {
    fc.assert(
      fc.property(
        side,
        side,
        fc.constantFrom('rectangle', 'round'),
        fc.constantFrom(25, 29),
        (width, across, shape, modules) => {
          const height = shape === 'round' ? width : across;
          const { qr, texts } = layoutLabel({ shape, width, height }, label, modules);

          expect(qr.module).toBeGreaterThan(0);
          expect(Math.min(qr.x, qr.y)).toBeGreaterThanOrEqual(-1e-9);
          expect(qr.x + qr.side).toBeLessThanOrEqual(width + 1e-9);
          expect(qr.y + qr.side).toBeLessThanOrEqual(height + 1e-9);
          expect(texts.map(({ text }) => text)).toContain(label.code);
          for (const { text, x, y, size, anchor } of texts) {
            const wide = monoWidth(text, size);
            const left = anchor === 'middle' ? x - wide / 2 : x;
            expect(left).toBeGreaterThanOrEqual(-1e-9);
            expect(left + wide).toBeLessThanOrEqual(width + 1e-9);
            expect(y - size * 0.72).toBeGreaterThanOrEqual(-1e-9);
            expect(y).toBeLessThanOrEqual(height + 1e-9);
            const clear = left >= qr.x + qr.side - 1e-9 || y - size * 0.72 >= qr.y + qr.side - 0.2 || y <= qr.y + 1e-9;
            expect(clear).toBe(true);
          }
        },
      ),
    );
  });
});

describe('QR codes of labels', () => {
  it.each(reference.qrVersions.filter(({ ecl }) => ecl === 'M'))(
    'when the text is $text, the smallest version that ISO/IEC 18004 allows is used',
    ({ text, modules, min_version_single_segment: version }) => {
      const code = QRCode.create(text, { errorCorrectionLevel: 'M' });

      expect([code.version, code.modules.size]).toEqual([version, modules]);
    },
  );

  it.each([
    ['http://localhost:3000', 2],
    ['https://farm.example.com', 2],
    [`https://${'a'.repeat(20)}`, 2],
    [`https://${'a'.repeat(21)}`, 3],
    [`https://${'a'.repeat(43)}`, 3],
    [`https://${'a'.repeat(44)}`, 4],
  ])('when the farm is at %s, its plugs need version %i', (origin, version) => {
    expect(QRCode.create(plugUrl(origin, '7Q2KX9M'), { errorCorrectionLevel: 'M' }).version).toBe(version);
  });

  it('when joined to runs, exactly the dark modules are covered, once each', () => {
    const { modules } = QRCode.create(label.qrText, { errorCorrectionLevel: 'M' });
    const isDark = (row: number, column: number) => modules.get(row, column) === 1;

    const covered = new Map<string, number>();
    for (const { x, y, length } of qrRuns(modules.size, isDark)) {
      for (let step = 0; step < length; step += 1) {
        const key = `${y}/${x + step}`;
        covered.set(key, (covered.get(key) ?? 0) + 1);
      }
    }

    const dark = Array.from({ length: modules.size ** 2 }, (_, index) => index)
      .map((index) => [Math.floor(index / modules.size), index % modules.size] as const)
      .filter(([row, column]) => isDark(row, column));
    expect([...covered.keys()].sort()).toEqual(dark.map(([row, column]) => `${row}/${column}`).sort());
    expect([...covered.values()].every((count) => count === 1)).toBe(true);
  });
});
