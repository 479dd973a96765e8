/** What a drift run takes for granted, to be said beside it. */
import type { Tables } from '../../tables/tables.ts';
import type { Store } from './driftNetwork.ts';

export function driftAssumptions(stores: readonly Store[], { chemistry }: Tables): readonly string[] {
  const strings = [...new Set(stores.map(({ string }) => string))];
  const lead = strings.filter(({ chemistry: kind }) => kind === 'flooded' || kind === 'agm' || kind === 'gel');
  const assumed = [
    'Each string starts at its charge in the first case of the cycle; what later cases say of charge is left aside.',
    'Capacity as entered, whatever the rate and the temperature; self-discharge left out.',
    'Slow resistance of the batteries throughout; each stretch is steady to its end.',
  ];
  if (lead.length > 0) {
    const kept = chemistry.chargeKept[lead[0]!.chemistry];
    assumed.push(
      'Lead strings take a charge against Shepherd’s polarisation, which grows as they fill, until gassing at 2.6 V a cell is the easier way (Schiffer et al. 2007; the steepness of gassing from memory).',
      `Lead strings keep ${percent(kept[0]!.value)} of a charge at first and ${percent(kept.at(-1)!.value)} when full (${kept[0]!.basis.text}).`,
    );
  }
  if (strings.some(({ chemistry: kind }) => kind === 'lfp' || kind === 'nmc')) {
    assumed.push(
      'Lithium cells run off steeply in volts when full or empty, after their published curve; no board is assumed to open.',
    );
  }
  return assumed;
}

function percent(fraction: number): string {
  return `${Math.round(100 * fraction)} %`;
}
