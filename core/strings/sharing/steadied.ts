/** A case whose loads take what they took at a point, whatever their volts. */

import { partsInCase } from '../../job/job.ts';
import type { JunctionId, LoadPart, Part } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import type { CircuitRequest } from '../../network/circuit.ts';

/**
 * The case with every load, inverter and converter input as a load of the current that it carries in a solved point: EMFs,
 * resistances and set currents, which have an answer where constant powers have none. What carries nothing there is left off.
 */
export function steadied(request: CircuitRequest, point: OperatingPoint): CircuitRequest {
  const { job, operatingCase } = request;
  const parts = partsInCase(job, operatingCase).map((part) => steady(part, point));
  const plain = { ...operatingCase, surge: undefined, changed: new Map() };
  return { ...request, job: { ...job, parts }, operatingCase: plain };
}

function steady(part: Part, point: OperatingPoint): Part {
  const answer = point.parts.get(part.id);
  switch (part.kind) {
    case 'load':
    case 'inverter':
      return setCurrent(part, part, answer?.currentA ?? 0);
    case 'converter':
      return setCurrent(part, part.from, answer?.inputA ?? 0);
    default:
      return part;
  }
}

function setCurrent(
  { id, label, note, locationTag, at, origin, range, given }: Part,
  { plus, minus }: { readonly plus: JunctionId; readonly minus: JunctionId },
  currentA: number,
): LoadPart {
  return {
    id,
    label,
    note,
    locationTag,
    at,
    origin,
    range,
    given,
    plus,
    minus,
    kind: 'load',
    powerW: undefined,
    currentA,
    resistanceOhm: undefined,
    on: currentA > 0,
    minimumV: undefined,
    maximumV: undefined,
    surgeW: undefined,
    surgeS: undefined,
    continuous: undefined,
    dropClass: undefined,
  };
}
