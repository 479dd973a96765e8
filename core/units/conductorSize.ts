/** Conductor sizes: five systems that look alike on paper and are not the same copper. */
import { type Parsed, quoted } from './parsed.ts';

/** A conductor size. The five kinds never convert silently; `core/conductor` says what each means in copper. */
export type ConductorSize =
  | { readonly system: 'mm2'; readonly areaMm2: number }
  /** `gauge` is n of the AWG formula: 10 for 10 AWG, 0 for 1/0, -1 for 2/0, -3 for 4/0. */
  | { readonly system: 'awg'; readonly gauge: number }
  | { readonly system: 'kcmil'; readonly areaKcmil: number }
  /** SAE gauge, `gauge` as for AWG; its wire is 3 to 11 % smaller than AWG of the same number. */
  | { readonly system: 'sae'; readonly gauge: number }
  /** "auto" cable sold by the outside diameter over the insulation, in millimetres. */
  | { readonly system: 'auto'; readonly outsideDiameterMm: number };

// Bounds against slips of the keyboard, wider than any conductor of this trade; no source.
const largestMm2 = 3000;
const largestKcmil = 3000;
const largestAutoMm = 60;
const thinnestGauge = 40;
const thickestGauge = -5;

const figure = String.raw`(\d+(?:\.\d+)?|\.\d+)`;
const gaugeFigure = String.raw`#?(\d{1,2}|0{1,6}|[1-6]\/0)`;
const mm2Pattern = new RegExp(`^${figure} ?(?:mm ?(?:2|\\^2|²)|sq\\.? ?mm|mm sq)$`, 'i');
const kcmilPattern = new RegExp(`^${figure} ?(?:kcmil|mcm)$`, 'i');
const autoPattern = new RegExp(`^${figure} ?(?:mm ?)?auto$`, 'i');
const gaugePattern = new RegExp(`^${gaugeFigure} ?(awg|b&s|sae)$`, 'i');
const gaugeAfterPattern = new RegExp(`^(awg|b&s|sae) ?${gaugeFigure}$`, 'i');
const aughtPattern = /^[1-6]\/0$/;

/**
 * Reads `35 mm2`, `35mm²`, `2/0 AWG`, `2/0`, `0000 AWG`, `250 kcmil`, `250 MCM`, `6 SAE`, `6 auto`. A bare number is refused with
 * the question that has to be answered, since it means different copper to different people.
 */
export function parseSize(text: string): Parsed<ConductorSize> {
  const written = text.length > 40 ? '' : text.trim().replace(/[\s\u00a0\u2009\u202f]+/g, ' ');
  const size = areaSize(written) ?? gaugeSize(written);
  if (size !== undefined) return { ok: true, value: size };
  return { ok: false, message: refusal(written, text) };
}

function areaSize(written: string): ConductorSize | undefined {
  const mm2 = mm2Pattern.exec(written)?.[1];
  if (mm2 !== undefined) return bounded(Number(mm2), largestMm2, (areaMm2) => ({ system: 'mm2', areaMm2 }));
  const kcmil = kcmilPattern.exec(written)?.[1];
  if (kcmil !== undefined) return bounded(Number(kcmil), largestKcmil, (areaKcmil) => ({ system: 'kcmil', areaKcmil }));
  const auto = autoPattern.exec(written)?.[1];
  if (auto !== undefined) {
    return bounded(Number(auto), largestAutoMm, (outsideDiameterMm) => ({ system: 'auto', outsideDiameterMm }));
  }
  return undefined;
}

function bounded(value: number, largest: number, size: (value: number) => ConductorSize): ConductorSize | undefined {
  return value > 0 && value <= largest ? size(value) : undefined;
}

function gaugeSize(written: string): ConductorSize | undefined {
  const before = gaugePattern.exec(written);
  const after = gaugeAfterPattern.exec(written);
  const number = before?.[1] ?? after?.[2] ?? (aughtPattern.test(written) ? written : undefined);
  if (number === undefined) return undefined;
  const gauge = gaugeNumber(number);
  if (gauge === undefined || gauge > thinnestGauge || gauge < thickestGauge) return undefined;
  const system = (before?.[2] ?? after?.[1] ?? 'awg').toLowerCase() === 'sae' ? 'sae' : 'awg';
  return { system, gauge };
}

/** n of the gauge formula: `10` is 10, `0` and `1/0` are 0, `2/0` and `00` are -1. */
function gaugeNumber(text: string): number | undefined {
  if (text.includes('/')) return 1 - Number(text[0]) + 0;
  if (/^0+$/.test(text)) return 1 - text.length + 0;
  return text.startsWith('0') ? undefined : Number(text);
}

const choices = '"35 mm2" (copper area), "2 AWG", "250 kcmil", "6 SAE" or "6 auto" (outside diameter in mm)';

function refusal(written: string, text: string): string {
  const got = `got ${quoted(text)}`;
  if (/^#?[\d.]+$/.test(written)) {
    return `expected a size with its system, ${got}: is that mm2 of copper, AWG, SAE gauge, or the outside diameter of "auto" cable? Write ${choices}`;
  }
  if (/^[\d.]+ ?mm$/.test(written)) {
    return `expected a size with its system, ${got}: is that mm2 of copper ("mm2") or the outside diameter of "auto" cable ("auto")?`;
  }
  if (/^#?[\d./]+ ?(ga|gauge)$/i.test(written)) {
    return `expected a size with its system, ${got}: is that AWG or the slightly smaller SAE gauge?`;
  }
  return `expected a conductor size such as ${choices}, ${got}`;
}

/** A size as written in the trade; `parseSize` reads it back. */
export function sizeText(size: ConductorSize): string {
  switch (size.system) {
    case 'mm2':
      return `${String(size.areaMm2)} mm²`;
    case 'awg':
      return `${gaugeText(size.gauge)} AWG`;
    case 'kcmil':
      return `${String(size.areaKcmil)} kcmil`;
    case 'sae':
      return `${gaugeText(size.gauge)} SAE`;
    case 'auto':
      return `${String(size.outsideDiameterMm)} mm auto`;
  }
}

function gaugeText(gauge: number): string {
  return gauge > 0 ? String(gauge) : `${String(1 - gauge)}/0`;
}
