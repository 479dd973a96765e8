/** The grey figure beside a field: the same quantity in the other units, or with the other prefix. */

import { isBareNumber } from './fieldReading.ts';
import { type FieldUnit, factor, type UnitsFirst } from './fieldUnit.ts';
import { formatQuantity } from './formatQuantity.ts';
import { fahrenheitText, feetText } from './imperial.ts';
import { numberText } from './numberText.ts';
import type { UnitName } from './unitName.ts';

export interface EchoRequest {
  readonly value: number;
  readonly unit: UnitName;
  /** What the person typed; without it the figure was a bare number and is shown in the units that come first. */
  readonly typed?: string;
  readonly first: UnitsFirst;
}

const imperialLength = /ft|feet|foot|in\b|inch|yd|yard|['"′″’”]/i;
const metricLength = /\d\s*(?:[kcdm]?m\b|[a-z]*met)/i;
const fahrenheitWord = /f/i;

/** 3.2 m is echoed as `10 ft 6 in`, 95 °F as `35 °C`, `210 mV` as `0.21 V`; empty where nothing is to be added. */
export function echoOf({ value, unit, typed, first }: EchoRequest): string {
  const written = typed === undefined || isBareNumber(typed) ? undefined : typed;
  if (unit === 'm') return lengthEcho(value, written, first);
  if (unit === 'degC') {
    const inFahrenheit = written === undefined ? first === 'us' : fahrenheitWord.test(written);
    return inFahrenheit ? formatQuantity({ value, unit }) : fahrenheitText({ temperatureDegC: value });
  }
  if (written === undefined || unit === '1' || unit === '1/K' || unit === 'deg') return '';
  return prefixEcho(value, unit, written);
}

function lengthEcho(lengthM: number, written: string | undefined, first: UnitsFirst): string {
  const metric = formatQuantity({ value: lengthM, unit: 'm' });
  if (written === undefined) return first === 'us' ? metric : feetText({ lengthM });
  if (!imperialLength.test(written)) {
    return isSum(written) ? `${metric} · ${feetText({ lengthM })}` : feetText({ lengthM });
  }
  return metricLength.test(written) ? `${metric} · ${feetText({ lengthM })}` : metric;
}

function isSum(written: string): boolean {
  return /\d.*[+\-−].*\d/.test(written.replace(/e[+-]/gi, 'e'));
}

/** The figure with the usual prefix or without one, whichever says something that the typed text does not. */
function prefixEcho(value: number, unit: UnitName, written: string): string {
  const number = Number(/[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?/i.exec(written)?.[0]);
  const differs = (text: string) =>
    isSum(written) || Math.abs(Number.parseFloat(text) - number) > Math.abs(number) * 1e-9;
  return [true, false].map((prefix) => formatQuantity({ value, unit, prefix })).find(differs) ?? '';
}

/** A stored number as it stands in its field, without the unit beside it: 0.0021 ohm beside `mΩ` is `2.1`. */
export function bareText(value: number, unit: UnitName, bare: FieldUnit): string {
  if (unit === 'degC') return numberText({ value: bare.word === 'degF' ? (value * 9) / 5 + 32 : value, digits: 12 });
  return numberText({ value: bare === factor ? value : value / (bare.worth ?? 1), digits: 12 });
}
