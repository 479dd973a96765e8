/** Collects what a solve took for granted, each figure once, with its range, origin and basis. */
import type { StringSource } from '../battery/stringSource.ts';
import type { ConductorResistance } from '../conductor/resistance.ts';
import type { CablePart, Part, StringPart } from '../job/part.ts';
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

  ofString(part: StringPart, source: StringSource): void {
    const figures = [
      { field: 'emfV', unit: 'V', banded: source.emfV },
      { field: 'resistanceOhm', unit: 'ohm', banded: source.resistanceOhm },
    ];
    for (const { field, unit, banded } of figures) {
      if (banded.origin !== 'default' && banded.origin !== 'guess') continue;
      this.list.push({
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
    for (const text of source.assumed) this.say(part, 'string', text, PRACTICE);
  }

  ofConductor(part: CablePart, conductor: ConductorResistance): void {
    for (const text of conductor.assumed) this.say(part, 'conductor', text, conductor.basis);
  }

  noHeating(part: CablePart, degC: number, missing: string): void {
    this.say(
      part,
      'conductorDegC',
      `conductor of ${part.id} taken at ${degC} degC, its own warming left out: ${missing}`,
      PRACTICE,
    );
  }

  private say(part: Part, field: string, text: string, basis: Basis): void {
    this.list.push({ part: part.id, field, value: text, unit: '', range: null, origin: 'default', basis, text });
  }
}
