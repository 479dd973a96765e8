/** A number with its unit as text, with the prefixes that the trade uses: mV, mΩ, kA, kW, kWh. */
import { fixedText, numberText } from './numberText.ts';

/** One way to write a unit: from `from` upwards, a figure is divided by `by` and followed by `sign`. */
interface Step {
  readonly from: number;
  readonly by: number;
  readonly sign: string;
}

/** Steps from the largest down; the last serves all that is smaller. Where to change over is trade habit, no source. */
const steps: ReadonlyMap<string, readonly Step[]> = new Map(
  Object.entries({
    V: [
      { from: 1, by: 1, sign: 'V' },
      { from: 0, by: 1e-3, sign: 'mV' },
    ],
    A: [
      { from: 1e3, by: 1e3, sign: 'kA' },
      { from: 1, by: 1, sign: 'A' },
      { from: 0, by: 1e-3, sign: 'mA' },
    ],
    W: [
      { from: 1e6, by: 1e6, sign: 'MW' },
      { from: 1e3, by: 1e3, sign: 'kW' },
      { from: 1, by: 1, sign: 'W' },
      { from: 0, by: 1e-3, sign: 'mW' },
    ],
    Wh: [
      { from: 1e6, by: 1e6, sign: 'MWh' },
      { from: 1e3, by: 1e3, sign: 'kWh' },
      { from: 0, by: 1, sign: 'Wh' },
    ],
    ohm: [
      { from: 1e6, by: 1e6, sign: 'MΩ' },
      { from: 1e3, by: 1e3, sign: 'kΩ' },
      { from: 1, by: 1, sign: 'Ω' },
      { from: 1e-5, by: 1e-3, sign: 'mΩ' },
      { from: 0, by: 1e-6, sign: 'µΩ' },
    ],
    s: [
      { from: 1, by: 1, sign: 's' },
      { from: 0, by: 1e-3, sign: 'ms' },
    ],
    m: [
      { from: 0.1, by: 1, sign: 'm' },
      { from: 0, by: 1e-3, sign: 'mm' },
    ],
  }),
);

/** How units without prefixes are written. */
const signs: ReadonlyMap<string, string> = new Map(
  Object.entries({
    V: 'V',
    A: 'A',
    W: 'W',
    Wh: 'Wh',
    ohm: 'Ω',
    s: 's',
    m: 'm',
    Ah: 'Ah',
    mV: 'mV',
    h: 'h',
    day: 'd',
    year: 'years',
    mm2: 'mm²',
    cm2: 'cm²',
    'm3/h': 'm³/h',
    A2s: 'A²s',
    degC: '°C',
    degF: '°F',
    K: 'K',
    deg: '°',
    'W/m2': 'W/m²',
    'kWh/m2/day': 'kWh/m² a day',
    '1/K': 'per K',
  }),
);

export interface QuantityText {
  readonly value: number;
  /** A unit of the program (`A`, `V`, `W`, `ohm`, `m`, `degC` …) or `1` for a fraction, which is written in per cent. */
  readonly unit: string;
  /** Most significant digits; 4 unless said otherwise. Temperatures and angles have one decimal instead. */
  readonly digits?: number;
  /** False keeps the unit as it is, for a column of figures in one unit. */
  readonly prefix?: boolean;
}

/** `0.0021 ohm` is `2.1 mΩ`, `1204.6 W` is `1.205 kW`, `0.72` of `1` is `72 %`. Never `-0`; the same in every country. */
export function formatQuantity({ value, unit, digits = 4, prefix = true }: QuantityText): string {
  if (unit === '1') return `${numberText({ value: value * 100, digits })} %`;
  if (unit === 'degC' || unit === 'degF') return `${fixedText({ value, decimals: 1 })} ${signs.get(unit) ?? unit}`;
  if (unit === 'A2s' && Math.abs(value) >= GROUPED_FROM && Number.isFinite(value))
    return `${grouped(value, digits)} A²s`;
  if (unit === 'deg') return `${fixedText({ value, decimals: 1 })}°`;
  const step = prefix ? stepFor({ value, unit, digits }) : undefined;
  if (step === undefined) return `${numberText({ value, digits })} ${signs.get(unit) ?? unit}`.trimEnd();
  return `${numberText({ value: value / step.by, digits })} ${step.sign}`;
}

/** Melting heats run into millions and have no prefix that everybody reads alike: thousands stand apart instead. */
const GROUPED_FROM = 10_000;

function grouped(value: number, digits: number): string {
  const whole = fixedText({ value: Number(value.toPrecision(digits)), decimals: 0 });
  return whole.replaceAll(/\B(?=(?:\d{3})+$)/g, '\u00a0');
}

/** The step is chosen by the rounded figure, so that 999.96 W to 4 digits is `1 kW` and not `1000 W`. */
function stepFor({ value, unit, digits }: { value: number; unit: string; digits: number }): Step | undefined {
  const size = Math.abs(Number(value.toPrecision(digits)));
  // Nought has no prefix.
  if (size === 0) return undefined;
  return steps.get(unit)?.find((step) => size >= step.from);
}
