/** What the study of protection says, in words. */
import type { DeviceStudy, FaultMethod, Finding, FuseWindow } from '../../../core/api.ts';
import { formatQuantity, provenance, SEVERITIES, timeText } from '../../../core/api.ts';

export const METHODS: readonly (readonly [method: FaultMethod, words: string, hint: string])[] = [
  ['plain', 'Plain', 'Volts over resistance: the rest volts of each string behind what it and the wiring resist.'],
  [
    'iec-61660',
    'IEC 61660-1',
    'Battery branch of IEC 61660-1: 0.9 of the resistance at the first instant, 0.95 of the volts once settled.',
  ],
];

export function amps(value: number, digits = 3): string {
  return formatQuantity({ value, unit: 'A', digits });
}

/** `2 of 11 fuses and breakers lie outside their window; 1 cannot interrupt its highest fault`. */
export function protectionTitle(devices: readonly DeviceStudy[]): string {
  if (devices.length === 0) return 'No fuse or breaker is drawn yet';
  const outside = devices.filter(({ window }) => !('missing' in window) && !window.fits).length;
  const weak = devices.filter(({ ok }) => ok === false).length;
  const slow = devices.filter(({ clearing }) => clearing?.clears === false).length;
  const told = [
    ...(outside > 0 ? [`${counted(outside, 'lies', 'lie')} outside ${outside === 1 ? 'its' : 'their'} window`] : []),
    ...(weak > 0 ? [`${counted(weak, 'cannot', 'cannot')} interrupt the highest fault`] : []),
    ...(slow > 0 ? [`${counted(slow, 'need', 'need')} not open at the lowest fault`] : []),
  ];
  const many = devices.length === 1 ? 'the one fuse or breaker' : `${String(devices.length)} fuses and breakers`;
  if (told.length > 0) return `Of ${many}, ${told.join('; ')}`;
  const isKnown = devices.every(
    ({ window, ok, clearing }) => !('missing' in window) && ok !== null && clearing !== null,
  );
  return isKnown
    ? `Of ${many}, none lies outside its window, and each opens its faults`
    : `Of ${many}, none is known to lie outside its window; some figures are missing`;
}

function counted(count: number, one: string, several: string): string {
  return `${String(count)} ${count === 1 ? one : several}`;
}

/** `F3 has opened within 0.2 s at the lowest fault, 480 A`. */
export function timeCurrentTitle({ id, fault, band, clearing }: DeviceStudy): string {
  if (fault === null) return `No source reaches ${id} in any case`;
  if (fault.lowestA === null) return `${id}: nothing lies behind it that a fault could be at`;
  const at = `the lowest fault, ${amps(fault.lowestA)}`;
  if ('missing' in band || clearing === null || clearing.clears === null) {
    return `Whether ${id} opens at ${at}, is not known`;
  }
  if (clearing.clearS === null) return `${id} need not open at ${at}`;
  return `${id} opens within ${timeText(clearing.clearS)} at ${at}`;
}

/** Where the band comes from, or what is missing for one. */
export function bandWords({ id, band }: Pick<DeviceStudy, 'id' | 'band'>): string {
  if ('missing' in band) return `There is no band for ${id}: ${band.missing} is missing.`;
  return `The band of ${id}: ${provenance(band)}.`;
}

/** Sentences of the picture, for whoever does not see it and whoever wants it exact. */
export function pictureWords(study: DeviceStudy): readonly string[] {
  const { id, fault, band, clearing, atHighest, upstream, downstream, withstand, letThrough, surges } = study;
  const sentences: string[] = [];
  if (clearing !== null) sentences.push(`Lowest fault${place(fault?.lowestAt)}: ${bare(clearing.text, band)}.`);
  if (atHighest !== null) sentences.push(`Highest fault${place(fault?.at)}: ${bare(atHighest.text, band)}.`);
  if (withstand !== null) {
    const heat = formatQuantity({ value: withstand.k2s2, unit: 'A2s', digits: 3 });
    const through =
      letThrough === null
        ? 'what is let through is not known'
        : `at most ${formatQuantity({ value: letThrough.i2t, unit: 'A2s', digits: 3 })} is let through, at ${amps(letThrough.currentA)}`;
    sentences.push(
      `Cable ${withstand.cable} stands ${heat} (k²S², k = ${String(Math.round(withstand.k))}); ${through}.`,
    );
  }
  for (const { part, currentA, seconds } of surges) {
    sentences.push(`While ${part} starts, ${amps(currentA)} flow for ${timeText(seconds)}.`);
  }
  if (upstream !== null)
    sentences.push(`Before it ${upstream.device}, ${amps(upstream.ratingA)}: ${alone(upstream, id)}.`);
  if (downstream !== null)
    sentences.push(
      `After it ${downstream.device}, ${amps(downstream.ratingA)}: ${alone(downstream, downstream.device)}.`,
    );
  return sentences;
}

/** Without where the band comes from: that is said once, above. */
function bare(text: string, band: DeviceStudy['band']): string {
  return 'missing' in band ? text : text.replace(` (${provenance(band)})`, '');
}

function place(at: string | null | undefined): string {
  return at === null || at === undefined ? '' : ` (at ${at})`;
}

function alone({ selectivity }: NonNullable<DeviceStudy['upstream']>, nearer: string): string {
  const { selective, text } = selectivity;
  if (selective === null) return `whether ${nearer} opens alone is open; ${text}`;
  return `${nearer} ${selective ? 'opens alone' : 'may not open alone'}; ${text}`;
}

/** `1.9 kA of 5 kA`; what is missing where one is not known. */
export function interruptWords({ fault, interruptA, ok }: Pick<DeviceStudy, 'fault' | 'interruptA' | 'ok'>): string {
  if (fault === null) return 'no source reaches it';
  const highest = `fault ${amps(fault.highestA)}`;
  if (interruptA === null || ok === null) return `${highest}; what it interrupts is not given`;
  return `${highest}, interrupts ${amps(interruptA)}: ${ok ? 'enough' : 'too little'}`;
}

/** The figures of a window between its signs. */
export function windowFigures({ loadA, continuousA, fuseA, allowedA, capA }: FuseWindow): string {
  const mostA = Math.min(allowedA, capA ?? Number.POSITIVE_INFINITY);
  const margin = continuousA > loadA * 1.005 ? ` (${amps(continuousA)} with margin)` : '';
  // Where the fuse lies outside its window the line says so, rather than a sum that is not true.
  const below = fuseA !== null && fuseA < loadA ? '>' : '≤';
  const above = fuseA !== null && fuseA > mostA ? '>' : '≤';
  return `load ${amps(loadA)}${margin} ${below} fuse ${fuseA === null ? '?' : amps(fuseA)} ${above} wire ${amps(mostA)}`;
}

/** The worst finding about each device goes first; otherwise as drawn. */
export function worstFirst(
  devices: readonly DeviceStudy[],
  findings: readonly Finding[],
): readonly { readonly device: DeviceStudy; readonly findings: readonly Finding[] }[] {
  const rows = devices.map((device) => ({ device, findings: findings.filter(({ parts }) => parts[0] === device.id) }));
  const rank = (some: readonly Finding[]): number =>
    Math.min(SEVERITIES.length, ...some.map(({ severity }) => SEVERITIES.indexOf(severity)));
  return rows.toSorted((a, b) => rank(a.findings) - rank(b.findings));
}
