/** Fields of one part that do not fit together, each right by itself. */
import type { Place } from './field.ts';
import type { ArrayPart, InverterPart, LoadPart, Part, StringPart } from './part.ts';
import { fieldPath } from './path.ts';

/** Adds an issue for everything in the part that contradicts something else in it. */
export function findContradictions(part: Part, place: Place): void {
  switch (part.kind) {
    case 'string':
      string(part, place);
      return;
    case 'load':
      load(part, place);
      return;
    case 'inverter':
      inverter(part, place);
      return;
    case 'array':
      array(part, place);
      return;
    case 'cable':
      differ(part.from, part.to, 'to', place);
      if (part.size === undefined && part.resistanceOhm === undefined) needsSize(place);
      return;
    case 'pair':
      differ(part.from.plus, part.from.minus, 'from', place);
      differ(part.to.plus, part.to.minus, 'to', place);
      differ(part.from.plus, part.to.plus, 'to', place);
      differ(part.from.minus, part.to.minus, 'to', place);
      if (part.size === undefined && part.resistanceOhm === undefined) needsSize(place);
      return;
    case 'controller':
    case 'converter':
      differ(part.from.plus, part.from.minus, 'from', place);
      differ(part.to.plus, part.to.minus, 'to', place);
      return;
    case 'charger':
      differ(part.plus, part.minus, 'minus', place);
      return;
    case 'busbar':
      return;
    default:
      differ(part.from, part.to, 'to', place);
  }
}

function contradiction(place: Place, field: string, words: string): void {
  place.issues.add(fieldPath(place.path, field), 'contradiction', () => `${field} of ${place.owner}: ${words}.`);
}

function differ(one: string, other: string, field: string, place: Place): void {
  if (one === other) contradiction(place, field, `both ends are at junction ${one}`);
}

function needsSize(place: Place): void {
  place.issues.add(fieldPath(place.path, 'size'), 'missing', () => {
    return `size of ${place.owner} is missing: give a size such as "35 mm2" or "2/0 AWG", or a measured resistanceOhm.`;
  });
}

function string(part: StringPart, place: Place): void {
  differ(part.plus, part.minus, 'minus', place);
  if (part.midpoint !== undefined && (part.midpoint === part.plus || part.midpoint === part.minus)) {
    contradiction(place, 'midpoint', `the midpoint cannot be junction ${part.midpoint}, which is an end of the string`);
  }
  if (part.resistanceOhm === 0 && part.linkOhm === 0) {
    contradiction(
      place,
      'resistanceOhm',
      'resistanceOhm and linkOhm are both 0; every real battery has some resistance',
    );
  }
}

function load(part: LoadPart, place: Place): void {
  differ(part.plus, part.minus, 'minus', place);
  const given = (['powerW', 'currentA', 'resistanceOhm'] as const).filter((field) => part[field] !== undefined);
  if (given.length === 0) {
    place.issues.add(fieldPath(place.path, 'powerW'), 'missing', () => {
      return `${place.owner} needs one of powerW, currentA and resistanceOhm.`;
    });
  }
  if (given.length > 1)
    contradiction(place, given[1]!, `give only one of powerW, currentA and resistanceOhm, got ${given.join(' and ')}`);
  if (part.minimumV !== undefined && part.maximumV !== undefined && part.minimumV >= part.maximumV) {
    contradiction(
      place,
      'minimumV',
      `must be less than maximumV (${String(part.maximumV)} V), got ${String(part.minimumV)} V`,
    );
  }
}

function inverter(part: InverterPart, place: Place): void {
  differ(part.plus, part.minus, 'minus', place);
}

function array(part: ArrayPart, place: Place): void {
  differ(part.plus, part.minus, 'minus', place);
  if (part.vmpV >= part.vocV) {
    contradiction(place, 'vmpV', `must be less than vocV (${String(part.vocV)} V), got ${String(part.vmpV)} V`);
  }
  if (part.impA >= part.iscA) {
    contradiction(place, 'impA', `must be less than iscA (${String(part.iscA)} A), got ${String(part.impA)} A`);
  }
}
