/** What each kind of part and each chemistry is called, on paper and on the screen. */
import type { Chemistry, PartKind } from '../job/part.ts';

export const KIND_WORDS: Readonly<Record<PartKind, string>> = {
  string: 'battery string',
  cable: 'cable',
  pair: 'out-and-back run',
  busbar: 'busbar',
  fuse: 'fuse',
  breaker: 'breaker',
  switch: 'switch',
  shunt: 'shunt',
  joint: 'joint',
  diode: 'diode',
  load: 'load',
  inverter: 'inverter',
  array: 'solar array',
  controller: 'solar controller',
  charger: 'charger',
  converter: 'DC converter',
  bond: 'bond',
};

export const CHEMISTRY_WORDS: Readonly<Record<Chemistry, string>> = {
  flooded: 'lead-acid, flooded',
  agm: 'lead-acid, AGM',
  gel: 'lead-acid, gel',
  lfp: 'lithium iron phosphate',
  nmc: 'lithium NMC',
  nicd: 'nickel-cadmium',
};
