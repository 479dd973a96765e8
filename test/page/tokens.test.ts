import { describe, expect, test } from 'vitest';
import { day, night, type Tokens } from '../../renderer/theme/tokens.ts';

/** Relative luminance and contrast after WCAG 2.2, definitions of *relative luminance* and *contrast ratio*. */
function luminance(colour: string): number {
  const [red, green, blue] = [1, 3, 5].map((at) => {
    const share = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!;
}
function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].toSorted((a, b) => b - a);
  return (light! + 0.05) / (dark! + 0.05);
}

const grounds = ['ground', 'sheet', 'lit'] as const;

describe.each([
  ['day', day],
  ['night', night],
])('the colours of %s', (_name, tokens: Tokens) => {
  test('black on white is 21 to 1, as the definition has it', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
  });
  test.each(['ink', 'soft', 'copper', 'volt', 'stop', 'fix', 'look', 'note'] as const)(
    '%s is readable as text on every ground (4.5 to 1)',
    (name) => {
      for (const ground of grounds) {
        expect(contrast(tokens[name], tokens[ground]), `${name} on ${ground}`).toBeGreaterThanOrEqual(4.5);
      }
    },
  );
  test('edges that must be seen stand out (3 to 1)', () => {
    for (const ground of ['ground', 'sheet'] as const) {
      expect(contrast(tokens.edge, tokens[ground]), `edge on ${ground}`).toBeGreaterThanOrEqual(3);
    }
  });
  test('text on copper is readable', () => {
    expect(contrast(tokens.onCopper, tokens.copper)).toBeGreaterThanOrEqual(4.5);
  });
});
