/** Collects what a solve took for granted, each figure once, with its range, origin and basis. */
import type { StringSource } from '../battery/stringSource.ts';
import type { ConductorResistance } from '../conductor/resistance.ts';
import type { CablePart, Part, StringPart } from '../job/part.ts';
import type { ArrayCurve } from '../solar/arrayCurve.ts';
import type { Basis } from '../tables/status.ts';
import type { Assumption } from './answer.ts';
import type { CircuitRequest } from './circuit.ts';

const PRACTICE: Basis = { source: 'SRC-PRACTICE', text: 'common practice, no source', status: 'common-practice' };

export class Assumptions {
  readonly list: Assumption[] = [];

  constructor(request: CircuitRequest, ambientDegC: number) {
    if (request.operatingCase.ambientDegC === undefined && request.job.site.ambientDesignDegC === undefined) {
      this.list.push({
        part: null,
        field: 'ambientDegC',
        value: ambientDegC,
        unit: 'degC',
        range: null,
        origin: 'default',
        basis: PRACTICE,
        text: `air around the parts taken as ${ambientDegC} degC, since neither the case nor the site gives one`,
      });
    }
  }

  /** A figure of a part that the job does not give. */
  plain(part: Part, field: string, value: number, unit: string): void {
    this.list.push({
      part: part.id,
      field,
      value,
      unit,
      range: null,
      origin: 'default',
      basis: PRACTICE,
      text: `${field} of ${part.id} taken as ${value}${unit === '1' ? '' : ` ${unit}`}`,
    });
  }

  add(more: readonly Assumption[]): void {
    for (const assumption of more) this.list.push(assumption);
  }
}

/** What a string's EMF and resistance rest on where the job does not give them. */
export function stringAssumptions(part: StringPart, source: StringSource): readonly Assumption[] {
  const figures = [
    { field: 'emfV', unit: 'V', banded: source.emfV },
    { field: 'resistanceOhm', unit: 'ohm', banded: source.resistanceOhm },
  ];
  const list: Assumption[] = [];
  for (const { field, unit, banded } of figures) {
    if (banded.origin !== 'default' && banded.origin !== 'guess') continue;
    list.push({
      part: part.id,
      field,
      value: banded.value,
      unit,
      range: [banded.low, banded.high],
      origin: banded.origin,
      basis: banded.basis,
      text: `${field} of ${part.id} from its chemistry, size and charge`,
    });
  }
  return [...list, ...source.assumed.map((text) => said(part, 'string', text, PRACTICE))];
}

/** What was filled in to find a conductor's resistance. */
export function conductorAssumptions(part: CablePart, conductor: ConductorResistance): readonly Assumption[] {
  return conductor.assumed.map((text) => said(part, 'conductor', text, conductor.basis));
}

export function noHeatingAssumption(part: CablePart, degC: number, missing: string): Assumption {
  const text = `conductor of ${part.id} taken at ${degC} degC, its own warming left out: ${missing}`;
  return said(part, 'conductorDegC', text, PRACTICE);
}

/** Typical figures of crystalline silicon where an array's label is silent. */
export function arrayAssumptions(part: Part, curve: ArrayCurve): readonly Assumption[] {
  const basis: Basis = { source: 'SRC-SOLAR-FOUR-PARAMETER', text: 'typical module labels', status: 'from-memory' };
  return curve.assumed.map((text) => said(part, 'array', text, basis));
}

function said(part: Part, field: string, text: string, basis: Basis): Assumption {
  return { part: part.id, field, value: text, unit: '', range: null, origin: 'default', basis, text };
}
