import { describe, expect, it } from 'vitest';
import { CALCULATORS } from '../../../shared/domain/calculators/index.ts';
import { domainErrorOf } from '../../support/domain-error.ts';
import carbonate from '../../reference/carbonate.json' with { type: 'json' };
import checks from '../../reference/check-characters.json' with { type: 'json' };
import survival from '../../reference/survival.json' with { type: 'json' };

function calculate(name: string, input: unknown) {
  const calculator = CALCULATORS[name];
  if (!calculator) throw new Error(`There is no calculation ${name}.`);
  return calculator.run(input);
}

const mix = { lime_g: 100, purity: 1, water_L: 40, temperature_C: 25 };

describe('inputs of a calculation', () => {
  it('when an unknown one is given, are refused with its name', () => {
    expect(domainErrorOf(() => calculate('limewater', { ...mix, lime_oz: 3 })).message).toContain('lime_oz');
  });

  it('when one is missing or of the wrong kind, are refused with all their names', () => {
    const error = domainErrorOf(() => calculate('limewater', { ...mix, purity: '0.9', water_L: undefined }));
    expect(error.code).toBe('input.invalid');
    expect(error.message).toBe('purity must be a number; water_L must be a number.');
  });

  it('when one that need not be given is null, are as if it were left out', () => {
    const usual = calculate('limewater', mix);
    expect(calculate('limewater', { ...mix, vinegar_mL: null, acid_percent: null })).toEqual(usual);
    expect(calculate('limewater', { ...mix, vinegar_mL: 0, acid_percent: 5 })).toEqual(usual);
  });

  it.each(['text', 7, null, [mix], undefined])('when they are %s instead of an object, are refused', (input) => {
    expect(domainErrorOf(() => calculate('limewater', input)).code).toBe('input.invalid');
  });
});

describe('limewater', () => {
  it('when more lime is given than dissolves, tells what settles and what vinegar does', () => {
    const plain = calculate('limewater', mix);
    const withVinegar = calculate('limewater', { ...mix, vinegar_mL: 200 });

    expect(plain).toMatchObject({ dissolved_g: expect.closeTo(59.72, 9), vinegar_helps: false });
    expect(plain.alkalinity_now_meq_L).toBe(plain.alkalinity_meq_L);
    expect(withVinegar).toMatchObject({ vinegar_helps: true });
    expect(Number(withVinegar.alkalinity_meq_L)).toBeGreaterThan(Number(plain.alkalinity_meq_L));
    expect(Number(withVinegar.alkalinity_now_meq_L)).toBeLessThan(Number(plain.alkalinity_now_meq_L));
  });
});

describe('carbonate', () => {
  it.each(carbonate.states)('of state $id is that of PyCO2SYS within 1e-6', (state) => {
    const { given, expected } = state;
    const found = calculate('carbonate', {
      ...{ salinity: state.salinity, temperature_C: state.temperatureC, alkalinity_umol_kg: given.alkalinityUmolKg },
      ...{ ph: 'ph' in given ? given.ph : null, ph_scale: 'total' },
      dic_umol_kg: 'dicUmolKg' in given ? given.dicUmolKg : null,
      pco2_uatm: 'pco2Uatm' in given ? given.pco2Uatm : null,
      ...{ calcium_mg_L: state.calciumMgL, boron: state.boron },
    });

    const relative = (name: string, value: number) => expect(Number(found[name]) / value).toBeCloseTo(1, 6);
    expect(found.ph_total).toBeCloseTo(expected.phTotal, 7);
    expect(found.ph_free).toBeCloseTo(expected.phFree, 7);
    expect(found.ph_sws).toBeCloseTo(expected.phSws, 7);
    expect(found.ph_nbs).toBeCloseTo(expected.phNbs, 7);
    relative('dic_umol_kg', expected.dicUmolKg);
    relative('pco2_uatm', expected.pco2Uatm);
    relative('hco3_umol_kg', expected.bicarbonateUmolKg);
    relative('co3_umol_kg', expected.carbonateUmolKg);
    relative('co2_umol_kg', expected.co2UmolKg);
    relative('omega_aragonite', expected.omegaAragonite);
    relative('omega_calcite', expected.omegaCalcite);
  });

  it('when one or three of the four are given, is refused', () => {
    const water = { salinity: 35, temperature_C: 25, alkalinity_umol_kg: 2300 };
    expect(domainErrorOf(() => calculate('carbonate', water)).message).toContain('two of');
    const three = { ...water, ph: 8.1, pco2_uatm: 400 };
    expect(domainErrorOf(() => calculate('carbonate', three)).message).toContain('two of');
  });
});

describe('density', () => {
  it('of seawater of salinity 35 at 25 °C is that of EOS-80 (UNESCO 1983, within 1e-6 of 1023.3412 kg/m³)', () => {
    const { density_kg_m3 } = calculate('density', { salinity: 35, temperature_C: 25 });
    expect(density_kg_m3).toBeCloseTo(1023.3412, 3);
  });
});

describe('salinity', () => {
  it('of 42.914 mS/cm at 15 °C (IPTS-68) is 35, by the definition of PSS-78 (UNESCO 1983)', () => {
    const { salinity } = calculate('salinity', { conductivity_mS_cm: 42.914, temperature_C: 15 / 1.00024 });
    expect(salinity).toBeCloseTo(35, 6);
  });
});

describe('demand', () => {
  const tests = Array.from({ length: 30 }, (_, day) => [day, 2.9 + (day % 2 ? 0.02 : -0.02)]);
  const steady = { readings: tests, supply: [[0, 30, 0.4]], water_changes: [], test_sd_meq_L: 0.05 };

  it('when a level holds on 0.4 meq/L a day, is that within its error, in the order of the days', () => {
    const found = calculate('demand', { ...steady, readings: [...tests].reverse() });
    expect(found.days).toEqual(tests.map(([day]) => expect.closeTo(day ?? NaN, 9)));
    const [last, sd] = [(found.demand as number[]).at(-1) ?? NaN, (found.demand_sd as number[]).at(-1) ?? NaN];
    expect(Math.abs(last - 0.4)).toBeLessThan(2 * sd);
    expect((found.demand_smoothed_sd as number[])[15]).toBeLessThan((found.demand_sd as number[])[15] ?? NaN);
    expect(found.flagged).toEqual(tests.map(() => false));
  });

  it('when a test was mistyped, flags it alone', () => {
    const readings = tests.map(([day, value]) => [day, day === 20 ? 9.2 : value]);
    const { flagged } = calculate('demand', { ...steady, readings });
    expect(flagged).toEqual(tests.map(([day]) => day === 20));
  });

  it('when there are no tests, has nothing to tell', () => {
    expect(calculate('demand', { ...steady, readings: [] })).toMatchObject({ days: [], demand: [], flagged: [] });
  });

  it.each([
    ['a supply that ends before it begins', { supply: [[5, 4, 0.4]] }],
    ['a water change of more than all', { water_changes: [[3, 1.2, 2.9]] }],
    ['a reading without its day', { readings: [[2.9]] }],
    ['tests without error', { test_sd_meq_L: 0 }],
  ])('refuses %s', (_, wrong) => {
    expect(domainErrorOf(() => calculate('demand', { ...steady, ...wrong })).code).toBe('input.invalid');
  });
});

describe('survival', () => {
  it.each(survival.cases)(
    'of $id is the curve that R survival has (Freireich et al. 1963)',
    ({ time, status, table }) => {
      const found = calculate('survival', { times: time, events: status });

      expect(found).toMatchObject({
        time: table.map(({ t }) => t),
        at_risk: table.map(({ atRisk }) => atRisk),
        lost: table.map(({ events }) => events),
      });
      expect(found.survival).toEqual(table.map((row) => expect.closeTo(row.survival, 12)));
      expect(found.se).toEqual(
        table.map((row) => (row.survival > 1e-9 ? expect.closeTo(row.greenwoodSe ?? NaN, 12) : null)),
      );
    },
  );

  it('when many plugs share a fate, counts do what repeated rows do', () => {
    const counted = calculate('survival', { times: [5, 5, 9], events: [1, 0, 0], counts: [2, 1, 3] });
    expect(counted).toEqual(calculate('survival', { times: [5, 5, 5, 9, 9, 9], events: [1, 1, 0, 0, 0, 0] }));
  });

  it('when the lists differ in length, is refused', () => {
    const error = domainErrorOf(() => calculate('survival', { times: [1, 2], events: [1] }));
    expect(error.message).toContain('one length');
  });
});

describe('code', () => {
  // ISO/IEC 7064 MOD 37-2: the check of B00017 is J (check-characters.json).
  const six = checks.mod37_2.filter(({ body }) => body.length === 6);

  it.each(six)('of $body with its published check $check is right, however it is written', ({ body, check }) => {
    const code = `${body}${check}`;
    const written = code.replaceAll('0', 'o').replaceAll('1', 'l').toLowerCase();
    for (const text of [code, written, `${code.slice(0, 3)}-${code.slice(3)}`, `HTTPS://FARM.EXAMPLE.COM/P/${code}`]) {
      expect(calculate('code', { text })).toEqual({ code, valid: true, suggestion: null });
    }
  });

  it.each(six)('when the check of $body is wrong, is the code as read, and not right', ({ body, check }) => {
    for (const wrong of [...checks.alphabet].filter((character) => character !== check)) {
      expect(calculate('code', { text: `${body}${wrong}`.toLowerCase() })).toMatchObject({
        ...{ code: `${body}${wrong}`, valid: false },
      });
    }
  });

  it.each([
    ['B0001J7', 'B00017J'],
    ['800017J', 'B00017J'],
    ['BA3DE4E', 'AB3DE4E'],
    ['4B3DE4E', 'AB3DE4E'],
  ])('when %s has a swap or a look-alike in it, suggests the one right code %s', (text, suggestion) => {
    expect(calculate('code', { text })).toEqual({ code: text, valid: false, suggestion });
  });

  it.each(['', 'B0001', 'B00017JJ', 'B0001*J', 'B00U17J'])('when it is "%s", has no shape of a code', (text) => {
    expect(calculate('code', { text })).toMatchObject({ code: null, valid: false });
  });
});
