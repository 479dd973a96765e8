import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type ConductorSize, parseSize, sizeText } from '../../core/units/conductorSize.ts';

describe('sizes as people write them', () => {
  test.each<[string, ConductorSize]>([
    ['35 mm2', { system: 'mm2', areaMm2: 35 }],
    ['35mm²', { system: 'mm2', areaMm2: 35 }],
    ['35 mm^2', { system: 'mm2', areaMm2: 35 }],
    ['2.5 sq mm', { system: 'mm2', areaMm2: 2.5 }],
    ['70MM2', { system: 'mm2', areaMm2: 70 }],
    ['2/0 AWG', { system: 'awg', gauge: -1 }],
    ['2/0', { system: 'awg', gauge: -1 }],
    ['4/0', { system: 'awg', gauge: -3 }],
    ['1/0 AWG', { system: 'awg', gauge: 0 }],
    ['0 AWG', { system: 'awg', gauge: 0 }],
    ['00 awg', { system: 'awg', gauge: -1 }],
    ['0000 AWG', { system: 'awg', gauge: -3 }],
    ['10 AWG', { system: 'awg', gauge: 10 }],
    ['#10 AWG', { system: 'awg', gauge: 10 }],
    ['AWG 10', { system: 'awg', gauge: 10 }],
    ['250 kcmil', { system: 'kcmil', areaKcmil: 250 }],
    ['250 MCM', { system: 'kcmil', areaKcmil: 250 }],
    ['6 SAE', { system: 'sae', gauge: 6 }],
    ['2/0 SAE', { system: 'sae', gauge: -1 }],
    ['6 auto', { system: 'auto', outsideDiameterMm: 6 }],
    ['2.5 mm auto', { system: 'auto', outsideDiameterMm: 2.5 }],
  ])('%s', (text, size) => {
    expect(parseSize(text)).toEqual({ ok: true, value: size });
  });

  // The five systems look alike on the drum and are different copper; 6 mm "auto" is about 4.6 mm2, 6 AWG is 13.3 mm2.
  test.each(['6', '35', '0', '00', '#10', '2.5'])('a bare %s is refused with the question to answer', (text) => {
    const parsed = parseSize(text);
    expect(parsed.ok ? '' : parsed.message).toContain('is that mm2 of copper, AWG, SAE gauge, or the outside diameter');
  });
  test('"6 mm" asks whether it is the area or the outside diameter', () => {
    const parsed = parseSize('6 mm');
    if (parsed.ok) throw new Error('6 mm was read as a size');
    expect(parsed.message).toContain('mm2 of copper ("mm2") or the outside diameter');
  });
  test('"10 gauge" asks which gauge', () => {
    const parsed = parseSize('10 gauge');
    if (parsed.ok) throw new Error('10 gauge was read as a size');
    expect(parsed.message).toContain('AWG or the slightly smaller SAE gauge');
  });
  test.each([
    '',
    '0 mm2',
    '-35 mm2',
    '5000 mm2',
    '41 AWG',
    '7/0',
    '2.5 AWG',
    '01 AWG',
    '5/0/0',
    '35 mm2 AWG',
    '35 kg',
    'big',
    'x'.repeat(100),
  ])('%j is no size', (text) => {
    expect(parseSize(text).ok).toBe(false);
  });
});

const anySize: fc.Arbitrary<ConductorSize> = fc.oneof(
  fc.integer({ min: 1, max: 10_000 }).map((tenths): ConductorSize => ({ system: 'mm2', areaMm2: tenths / 10 })),
  fc.integer({ min: -5, max: 40 }).map((gauge): ConductorSize => ({ system: 'awg', gauge })),
  fc.integer({ min: 1, max: 3000 }).map((areaKcmil): ConductorSize => ({ system: 'kcmil', areaKcmil })),
  fc.integer({ min: -5, max: 40 }).map((gauge): ConductorSize => ({ system: 'sae', gauge })),
  fc.integer({ min: 1, max: 60 }).map((outsideDiameterMm): ConductorSize => ({ system: 'auto', outsideDiameterMm })),
);

test('a size that is written is read back as the same size', () => {
  fc.assert(
    fc.property(anySize, (size) => {
      expect(parseSize(sizeText(size))).toEqual({ ok: true, value: size });
    }),
    { seed: 21, numRuns: 500 },
  );
});

test('no text whatever makes it throw', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary', maxLength: 60 }), (text) => {
      expect(typeof parseSize(text).ok).toBe('boolean');
    }),
    { seed: 22, numRuns: 1000 },
  );
});
