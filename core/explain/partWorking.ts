/** How the answer about one part is worked out, line by line. */

import { cablesOfPair } from '../job/part.ts';
import { isWiring, type SinglePart } from '../network/wiring.ts';
import { Lines } from './lines.ts';
import { controllerWorking, converterWorking, inverterWorking, loadWorking } from './loadWorking.ts';
import { partAsked } from './partFigures.ts';
import { arrayWorking, chargerWorking, stringWorking } from './sourceWorking.ts';
import { wiringWorking } from './wiringWorking.ts';
import type { PartRequest, WorkingLine } from './workingLine.ts';

/**
 * The working of a part's answer as lines that can be followed with a pocket calculator: name, formula in symbols, the same with
 * the figures in it, result, where each figure comes from. A line that reproduces a figure of the answer says which. What the
 * network does not determine is `null` with the reason. An out-and-back run answers with its two cables one after the other.
 * Empty for an id that is no part.
 */
export function partWorking(request: PartRequest): readonly WorkingLine[] {
  const part = partAsked(request);
  if (part === undefined) return [];
  if (part.kind !== 'pair') return workingOf(part, request);
  return cablesOfPair(part).flatMap((cable) =>
    workingOf(cable, request).map((line) => ({ ...line, name: `${cable.id}: ${line.name}` })),
  );
}

function workingOf(part: SinglePart, request: PartRequest): readonly WorkingLine[] {
  const { point } = request;
  const answer = point.parts.get(part.id);
  if (answer === undefined) return [];
  const lines = new Lines(part, answer, point);
  if (point.outcome !== 'solved') {
    const values = point.outcome === 'collapse' ? 'no operating point' : 'no source in this case';
    const why = point.collapse?.message ?? 'nothing in this case supplies the network';
    lines.add({ name: 'Current', formula: 'I', values, value: null, unit: 'A', why });
    return lines.list;
  }
  write(part, request, lines);
  return lines.list;
}

function write(part: SinglePart, request: PartRequest, lines: Lines): void {
  if (isWiring(part)) {
    wiringWorking(part, request, lines);
    return;
  }
  switch (part.kind) {
    case 'string':
      stringWorking(part, request, lines);
      return;
    case 'array':
      arrayWorking(part, request, lines);
      return;
    case 'charger':
      chargerWorking(part, lines);
      return;
    case 'load':
      loadWorking(part, request, lines);
      return;
    case 'inverter':
      inverterWorking(part, request, lines);
      return;
    case 'controller':
      controllerWorking(part, lines);
      return;
    case 'converter':
      converterWorking(part, lines);
  }
}
