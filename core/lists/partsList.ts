/** Every part of a job, in its order, with what tells it apart in a shop. */
import { CHEMISTRY_WORDS, KIND_WORDS } from '../diagram/kindWords.ts';
import { junctionsOf, type Part } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { given, type List, type ListInput } from './list.ts';

const headings = ['Id', 'Label', 'Kind', 'Particulars', 'Place', 'Touches', 'Note'];

export function partsList({ job }: ListInput): List {
  const rows = job.parts.map((part): readonly string[] => [
    part.id,
    part.label ?? '',
    KIND_WORDS[part.kind],
    particulars(part)
      .filter((words) => words !== '')
      .join(', '),
    part.locationTag ?? '',
    junctionsOf(part).join('; '),
    part.note ?? '',
  ]);
  return { headings, rows };
}

/** A figure with its unit as given, or nothing. */
function figure(value: number | undefined, unit: string, what = ''): string {
  return value === undefined ? '' : `${what === '' ? '' : `${what} `}${formatQuantity({ value, unit, digits: 6 })}`;
}
function flat(value: number | undefined, sign: string): string {
  return value === undefined ? '' : `${given(value)} ${sign}`;
}

function particulars(part: Part): readonly string[] {
  switch (part.kind) {
    case 'string':
      return [
        CHEMISTRY_WORDS[part.chemistry],
        `${String(part.blocksInSeries)} × ${flat(part.blockNominalV, 'V')}`,
        flat(part.capacityAh, 'Ah'),
      ];
    case 'cable':
    case 'pair':
      return [
        part.size === undefined ? '' : sizeText(part.size),
        part.kind === 'pair' && part.minusSize !== undefined ? `back ${sizeText(part.minusSize)}` : '',
        part.inParallel === 1 ? '' : `${String(part.inParallel)} in parallel`,
        `${flat(part.lengthM, 'm')}${part.kind === 'pair' ? ' one way' : ''}`,
        part.metal?.replace('-', ' ') ?? '',
        part.insulationDegC === undefined ? '' : `insulation ${flat(part.insulationDegC, '°C')}`,
      ];
    case 'bond':
      return [part.size === undefined ? '' : sizeText(part.size), flat(part.lengthM, 'm')];
    case 'busbar':
      return [flat(part.ratingA, 'A'), flat(part.ratingV, 'V'), `${String(part.junctions.length)} points`];
    case 'fuse':
    case 'breaker':
      return [
        part.type ?? '',
        flat(part.ratingA, 'A'),
        flat(part.ratingV, 'V DC'),
        part.interruptA === undefined ? '' : `interrupts ${flat(part.interruptA, 'A')}`,
        part.kind === 'breaker' && part.manualReset === true ? 'manual reset' : '',
      ];
    case 'switch':
      return [flat(part.ratingA, 'A'), flat(part.ratingV, 'V'), part.loadBreak === true ? 'breaks under load' : ''];
    case 'shunt':
      return [flat(part.ratingA, 'A'), flat(part.ratingMv, 'mV')];
    case 'joint':
      return [figure(part.resistanceOhm, 'ohm')];
    case 'diode':
      return [flat(part.ratingA, 'A'), flat(part.forwardV, 'V forward')];
    case 'load':
      return [figure(part.powerW, 'W'), flat(part.currentA, 'A'), figure(part.resistanceOhm, 'ohm')];
    case 'inverter':
      return [figure(part.ratedW, 'W', 'rated'), figure(part.surgeW, 'W', 'surge')];
    case 'array':
      return [
        `${String(part.modulesInSeries)} in series`,
        `${String(part.stringsInParallel)} in parallel`,
        `per module ${flat(part.vocV, 'V open')}`,
        flat(part.iscA, 'A short'),
      ];
    case 'controller':
      return [part.type.toUpperCase(), flat(part.outputA, 'A'), `input up to ${flat(part.maxInputV, 'V')}`];
    case 'charger':
      return [part.source ?? '', flat(part.outputA, 'A'), flat(part.setpointV, 'V')];
    case 'converter':
      return [flat(part.outputV, 'V out'), flat(part.outputA, 'A')];
  }
}
