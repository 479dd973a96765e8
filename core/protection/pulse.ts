/** Whether a fuse outlasts a surge that is no fault. */
import type { PulseShare } from '../tables/deviceTables.ts';
import type { Tables } from '../tables/tables.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { DeviceBand } from './answer.ts';
import { clearingOf, provenance, timeText } from './clearing.ts';

export interface SurgeAnswer {
  /** Null: the band does not say how long the device holds the current. */
  readonly holds: boolean | null;
  /** Seconds that it surely holds, shortened for the number of surges. */
  readonly holdS: number | null;
  readonly text: string;
}

/**
 * Whether a surge (I, t) lies left of the band of shortest melting. With `pulses`, each surge may bring only a share of the heat that
 * melts: 48 % for 100 of them down to 22 % for 100 000, so the time is shortened by that share. The next larger listed number counts;
 * beyond the list, the last share. Source SRC-FUSE-PULSES.
 */
export function surgeAgainstMelt(
  {
    band,
    currentA,
    durationS,
    pulses,
  }: { readonly band: DeviceBand; readonly currentA: number; readonly durationS: number; readonly pulses?: number },
  tables: Pick<Tables, 'devices'>,
): SurgeAnswer {
  const at = formatQuantity({ value: currentA, unit: 'A' });
  const held = clearingOf({ band, currentA }).holdS;
  if (held === null)
    return { holds: null, holdS: null, text: `how long it holds ${at} is not known (${provenance(band)})` };
  const holdS = held * (pulses === undefined ? 1 : pulseShare(pulses, tables));
  const many = pulses === undefined ? '' : ` ${pulses} times over`;
  const text = `it holds ${at} for ${timeText(holdS)}${many}; the surge lasts ${timeText(durationS)} (${provenance(band)})`;
  return { holds: durationS <= holdS, holdS, text };
}

/** Share of the melting heat that so many pulses may each bring; 1 for a single one. Source SRC-FUSE-PULSES. */
export function pulseShare(pulses: number, { devices }: Pick<Tables, 'devices'>): number {
  if (pulses <= 1) return 1;
  const found: PulseShare | undefined = devices.pulses.find((row) => row.pulses >= pulses) ?? devices.pulses.at(-1);
  return found?.share.value ?? 1;
}
