import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { formatQuantity, parseQuantity, QuantityError, splitQuantity, type Unit } from '../../../model/design/values.ts';

const UNITS: Unit[] = ['Ω', 'F', 'V', 'A', 'Hz', 's', 'S', 'H', 'V/s', '1/V', '°C', 'dB', ''];

describe('reading', () => {
  test.each([
    // IEC 60062, examples of the letter code, from memory
    ['R10', 'Ω', 0.1],
    ['R332', 'Ω', 0.332],
    ['1R0', 'Ω', 1],
    ['5R90', 'Ω', 5.9],
    ['33R2', 'Ω', 33.2],
    ['100R', 'Ω', 100],
    ['1K0', 'Ω', 1000],
    ['1k0', 'Ω', 1000],
    ['5K90', 'Ω', 5900],
    ['100K', 'Ω', 100e3],
    ['1M0', 'Ω', 1e6],
    ['3M32', 'Ω', 3.32e6],
    ['1G0', 'Ω', 1e9],
    ['1T0', 'Ω', 1e12],
    ['p10', 'F', 0.1e-12],
    ['p332', 'F', 0.332e-12],
    ['5p90', 'F', 5.9e-12],
    ['100p', 'F', 100e-12],
    ['1n0', 'F', 1e-9],
    ['100n', 'F', 100e-9],
    ['3μ32', 'F', 3.32e-6],
    ['2u2', 'F', 2.2e-6],
    ['1m0', 'F', 1e-3],
  ] as [string, Unit, number][])('the letter code %s %s is %d', (text, unit, value) => expect(parseQuantity(text, unit)).toBe(value));

  test.each([
    ['6k8', 'Ω', 6800],
    ['4R7', 'Ω', 4.7],
    ['1M2', 'Ω', 1.2e6],
    ['1.2 M', 'Ω', 1.2e6],
    ['1200k', 'Ω', 1.2e6],
    ['10 kΩ', 'Ω', 10e3],
    ['10\u2009kΩ', 'Ω', 10e3],
    ['10\u00a0k\u2126', 'Ω', 10e3],
    ['10\u202fkOhm', 'Ω', 10e3],
    ['4.7e5', 'Ω', 470e3],
    ['4.7E5 Ω', 'Ω', 470e3],
    ['47', 'Ω', 47],
    ['0', 'Ω', 0],
    ['1m', 'Ω', 1e-3],
    ['0.1u', 'F', 1e-7],
    ['0.1µF', 'F', 1e-7],
    ['.1 μ', 'F', 1e-7],
    ['100 nF', 'F', 1e-7],
    ['-1.2', 'V', -1.2],
    ['−1.2 V', 'V', -1.2],
    ['- 50 mV', 'V', -0.05],
    ['3V3', 'V', 3.3],
    ['+5', 'V', 5],
    ['3m', 'A', 3e-3],
    ['1e−14', 'A', 1e-14],
    ['10fA', 'A', 1e-14],
    ['4.2Hz', 'Hz', 4.2],
    ['1k5', 'Hz', 1500],
    ['10 ms', 's', 0.01],
    ['5', 's', 5],
    ['1pS', 'S', 1e-12],
    ['4H5', 'H', 4.5],
    ['100 mH', 'H', 0.1],
    ['13M', 'V/s', 13e6],
    ['0.5 MV/s', 'V/s', 5e5],
    ['500k', 'V/s', 5e5],
    ['20m/V', '1/V', 0.02],
    ['0.02 1/V', '1/V', 0.02],
    ['25 °C', '°C', 25],
    ['-40C', '°C', -40],
    ['+18.0 dB', 'dB', 18],
    ['0.476', '', 0.476],
    ['1e-3', '', 1e-3],
  ] as [string, Unit, number][])('“%s” in %s is %d', (text, unit, value) => expect(parseQuantity(text, unit)).toBe(value));

  test.each([
    ['1M2k', 'Ω', '“1M2k” is not a resistance.', 'Write 1M2, 1.2 M or 1200 k.'],
    ['10K', 'F', '“10K” is not a capacitance.', 'Write 100n, 0.1 u or 100 nF.'],
    ['100nF', 'Ω', '“100nF” is not a resistance.', 'Write 1M2, 1.2 M or 1200 k.'],
    ['', 'V', 'A voltage is missing.', 'Write -1.2, 1V2 or 50 mV.'],
    ['1,2 k', 'Ω', '“1,2 k” has a comma.', 'Use a point for decimals, and nothing for thousands. Write 1M2, 1.2 M or 1200 k.'],
    ['13 V/us', 'V/s', '“13 V/us” is not a slew rate.', 'Write 13M, 0.5e6 or 500k.'],
    ['4 F', 'H', '“4 F” is not an inductance.', 'Write 4, 4H5 or 100 mH.'],
    ['1e999', 'Ω', '“1e999” is beyond what can be computed.', 'Write 1M2, 1.2 M or 1200 k.'],
    ['1e-999', 'Ω', '“1e-999” is beyond what can be computed.', 'Write 1M2, 1.2 M or 1200 k.'],
  ] as [string, Unit, string, string][])('“%s” in %s is refused: %s', (text, unit, fault, advice) => {
    const error = errorOf(() => parseQuantity(text, unit));
    expect(error).toBeInstanceOf(RangeError);
    expect(error).toMatchObject({ fault, advice, message: `${fault} ${advice}` });
  });

  test('half-written and strange texts are refused, never guessed', () => {
    for (const text of [
      '-',
      '.',
      'k',
      'e5',
      '1e',
      '1 2',
      '6 k8',
      '1.2M5',
      '1k2k',
      '--1',
      'NaN',
      'Infinity',
      '0x10',
      '1_000',
      '6k8%',
      'k',
      '1MM',
    ]) {
      expect(
        errorOf(() => parseQuantity(text, 'Ω')),
        text,
      ).toBeInstanceOf(QuantityError);
    }
    for (const text of ['25k', '2m'])
      expect(
        errorOf(() => parseQuantity(text, '°C')),
        text,
      ).toBeInstanceOf(QuantityError);
  });

  test('any text gives a finite value or a QuantityError', () => {
    const nearly = fc.string({ unit: fc.constantFrom(...'0123456789.,-−+eEkKmMuµRΩFVzHsS/C° %') });
    fc.assert(
      fc.property(fc.oneof(nearly, fc.string({ unit: 'grapheme' })), fc.constantFrom(...UNITS), (text, unit) => {
        try {
          expect(Number.isFinite(parseQuantity(text, unit))).toBe(true);
        } catch (error) {
          expect(error).toBeInstanceOf(QuantityError);
        }
      }),
      { seed: 1, numRuns: 3000 },
    );
  });

  test('a prefix gives the nearest double to the decimal, as the same number with an exponent does', () => {
    fc.assert(
      fc.property(
        fc.nat(999),
        fc.nat(999),
        fc.constantFrom(['p', -12], ['n', -9], ['u', -6], ['m', -3], ['k', 3], ['M', 6]),
        (whole, part, [letter, power]) => {
          const expected = Number(`${whole}.${part}e${power}`);
          expect(parseQuantity(`${whole}${letter}${part}`, 'F')).toBe(expected);
          expect(parseQuantity(`${whole}.${part} ${letter}F`, 'F')).toBe(expected);
        },
      ),
      { seed: 2 },
    );
  });
});

describe('printing', () => {
  test.each([
    [6800, 'Ω', '6.80 kΩ'],
    [910e3, 'Ω', '910 kΩ'],
    [1e6, 'Ω', '1.00 MΩ'],
    [999.6, 'Ω', '1.00 kΩ'],
    [0, 'Ω', '0 Ω'],
    [1e12, 'Ω', '1.00 TΩ'],
    [220e9, 'Ω', '220 GΩ'],
    [100e-9, 'F', '100 nF'],
    [0.5e-12, 'F', '0.500 pF'],
    [1e-3, 'F', '1000 μF'],
    [1, 'F', '1.00 F'],
    [-1.2, 'V', '−1.20 V'],
    [0.059, 'V', '59.0 mV'],
    [3e-3, 'A', '3.00 mA'],
    [1e-14, 'A', '10.0 fA'],
    [4.2, 'Hz', '4.20 Hz'],
    [0.2, 'Hz', '0.200 Hz'],
    [60e-3, 's', '60.0 ms'],
    [1e-12, 'S', '1.00 pS'],
    [4.5, 'H', '4.50 H'],
    [0.1, 'H', '100 mH'],
    [13e6, 'V/s', '13.0 MV/s'],
    [500e3, 'V/s', '500 kV/s'],
    [0.02, '1/V', '0.0200 /V'],
    [25, '°C', '25.0 °C'],
    [-18.96, 'dB', '−19.0 dB'],
    [-0.04, 'dB', '0.0 dB'],
    [0.47644, '', '0.476'],
    [1e-9, '', '1.00e−9'],
  ] as [number, Unit, string][])('%d in %s prints as %s', (value, unit, printed) =>
    expect(formatQuantity(value, unit)).toBe(printed.replace(' ', '\u2009')),
  );

  test('signs, digits and trimmed zeros are as asked', () => {
    expect(formatQuantity(18, 'dB', 3, { signed: true })).toBe('+18.0\u2009dB');
    expect(formatQuantity(0, 'dB', 3, { signed: true })).toBe('0.0\u2009dB');
    expect(formatQuantity(10e3, 'Ω', 3, { trimmed: true })).toBe('10\u2009kΩ');
    expect(formatQuantity(4.7e3, 'Ω', 3, { trimmed: true })).toBe('4.7\u2009kΩ');
    expect(formatQuantity(1e-9, '', 3, { trimmed: true })).toBe('1e−9');
    expect(formatQuantity(1234.5, 'Ω', 5)).toBe('1.2345\u2009kΩ');
    expect(splitQuantity(6800, 'Ω')).toEqual({ number: '6.80', unit: 'kΩ' });
    expect(() => formatQuantity(1, 'V', 0)).toThrow('digits is 0; expected 2 to 15');
  });

  test('what is not finite prints as no reading', () => {
    for (const value of [NaN, Infinity, -Infinity]) expect(formatQuantity(value, 'dB')).toBe('no reading');
  });

  test('a printed value reads back within half of its last digit', () => {
    const value = fc.double({ min: -1e14, max: 1e14, noNaN: true, noDefaultInfinity: true });
    const digits = fc.integer({ min: 2, max: 12 });
    fc.assert(
      fc.property(value, fc.integer({ min: -28, max: 0 }), fc.constantFrom(...UNITS), digits, (mantissa, decade, unit, figures) => {
        const original = mantissa * Number(`1e${decade}`);
        const back = parseQuantity(formatQuantity(original, unit, figures), unit);
        const fixed = unit === 'dB' || unit === '°C';
        const bound = 0.5 * 10 ** (fixed ? 2 - figures : 1 - figures) * (fixed ? 1 : Math.abs(original));
        // A part in 1e15 of room for the two conversions between decimal and binary.
        expect(Math.abs(back - original)).toBeLessThanOrEqual(bound + 1e-15 * Math.abs(original));
      }),
      { seed: 3, numRuns: 2000 },
    );
  });

  test('within a decade the printed width never changes', () => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 9.994, noNaN: true }), fc.integer({ min: -12, max: 8 }), (mantissa, decade) => {
        const width = (value: number) => formatQuantity(value, 'Ω').length;
        expect(width(mantissa * 10 ** decade)).toBe(width(5 * 10 ** decade));
      }),
      { seed: 4 },
    );
  });
});

function errorOf(action: () => unknown): unknown {
  try {
    action();
  } catch (error) {
    return error;
  }
  return undefined;
}
