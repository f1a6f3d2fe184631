import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readingValue } from '../../../shared/domain/reading-value.ts';
import { suggestionWords, suspectValue } from '../../../shared/domain/suspect-value.ts';
import { MEQ_PER_DKH, PARAMETER_CODES, PARAMETERS, type ParameterCode, unitsOf } from '../../../shared/domain/units.ts';

const EIGHT_DKH = 8.2 * MEQ_PER_DKH;

// Slips that people make; what is usual for coral water is common practice, no source.
const SLIPS: [string, ParameterCode, number, string, number | null, string, 'impossible' | 'unusual'][] = [
  ['a point that went astray', 'alkalinity', 83, 'dKH', EIGHT_DKH, '8.3 dKH', 'impossible'],
  ['a point that went astray, nothing known before', 'alkalinity', 83, 'dKH', null, '8.3 dKH', 'impossible'],
  ['a point too far left', 'ph', 0.82, 'pH', 8.2, '8.2', 'impossible'],
  ['a specific gravity without its point', 'salinity', 1026, 'sg', 34.6, '1.026 SG 25/25 °C', 'impossible'],
  ['a calcium in the field of alkalinity', 'alkalinity', 450, 'dKH', EIGHT_DKH, 'Calcium 450 mg/L', 'impossible'],
  ['a magnesium in the field of calcium', 'calcium', 1345, 'mg/L', 430, 'Magnesium 1345 mg/L', 'impossible'],
  ['a temperature in the field of pH', 'ph', 25.7, 'pH', 8.2, 'Temperature 25.7 °C', 'impossible'],
  ['mg/L as calcium carbonate typed as dKH', 'alkalinity', 146, 'dKH', EIGHT_DKH, '146 ppm CaCO₃', 'impossible'],
  ['dKH typed as meq/L', 'alkalinity', 8.2, 'meq/L', EIGHT_DKH, '8.2 dKH', 'unusual'],
  ['meq/L typed as dKH', 'alkalinity', 2.9, 'dKH', EIGHT_DKH, '2.9 meq/L', 'unusual'],
  ['degrees Fahrenheit typed as Celsius', 'temperature', 78, 'C', 25.7, '78 °F', 'impossible'],
  ['a specific gravity typed as ppt', 'salinity', 1.0255, 'ppt', 35, '1.0255 SG 25/25 °C', 'impossible'],
];

describe('suspectValue', () => {
  it.each(SLIPS)('%s is asked about with what was meant', (_, parameter, value, unit, last, meant, kind) => {
    const suspicion = suspectValue(parameter, value, unit, last);

    expect(suspicion?.kind).toBe(kind);
    const [first] = suspicion?.suggestions ?? [];
    expect(first && suggestionWords(first, parameter)).toBe(meant);
    expect(suspicion?.message).toContain(`Did you mean ${meant}?`);
  });

  it('says how far an unusual value is from the last one, in the unit that was typed', () => {
    expect(suspectValue('alkalinity', 11.5, 'dKH', EIGHT_DKH)).toMatchObject({
      kind: 'unusual',
      message: 'Alkalinity of 11.5 dKH is far from the last, 8.2 dKH.',
    });
    expect(suspectValue('nitrate', 120, 'mg/L', null)?.message).toBe(
      'Nitrate of 120 mg/L is unusual for coral water. Did you mean 12 mg/L?',
    );
  });

  it('asks nothing where the farm is used to an odd level, nor about a usual value', () => {
    expect(suspectValue('nitrate', 120, 'mg/L', 110)).toBeNull();
    expect(suspectValue('alkalinity', 8.4, 'dKH', EIGHT_DKH)).toBeNull();
    for (const { code, band } of PARAMETERS) expect(suspectValue(code, (band.min + band.max) / 2, '', null)).toBeNull();
  });

  it('what is suggested can be stored and is itself not asked about, whatever was typed', () => {
    fc.assert(
      fc.property(
        fc
          .constantFrom(...PARAMETER_CODES)
          .chain((code) => fc.tuple(fc.constant(code), fc.constantFrom(...unitsOf(code)))),
        fc.double({ min: 0, max: 5000, noNaN: true }),
        fc.boolean(),
        ([code, unit], typed, isKnown) => {
          const band = PARAMETERS.find((each) => each.code === code)?.band;
          const last = isKnown && band ? (band.min + band.max) / 2 : null;
          const suspicion = suspectValue(code, typed, unit, last);
          for (const { parameter, value, unit: meant } of suspicion?.suggestions ?? []) {
            expect(readingValue(parameter, value, meant).problem).toBeNull();
            expect(suspectValue(parameter, value, meant, parameter === code ? last : null)).toBeNull();
          }
          if (suspicion === null) expect(readingValue(code, typed, unit).problem).toBeNull();
        },
      ),
    );
  });
});
