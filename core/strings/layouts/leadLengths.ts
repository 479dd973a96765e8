/** A case in which some cables are longer or shorter than drawn. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import type { CablePart, PairPart, Part, PartId } from '../../job/part.ts';

/** `scales`: new length over length as drawn, by cable; a measured resistance goes with the length. A run of two conductors by `<id>.plus` and `<id>.minus`. */
export function withLeads(
  job: CheckedJob,
  operatingCase: OperatingCase,
  scales: ReadonlyMap<PartId, number>,
): OperatingCase {
  const changed = new Map(operatingCase.changed);
  for (const part of partsInCase(job, operatingCase)) {
    const scaled = scaledPart(part, scales);
    if (scaled !== part) changed.set(part.id, scaled);
  }
  return { ...operatingCase, changed };
}

function scaledPart(part: Part, scales: ReadonlyMap<PartId, number>): Part {
  if (part.kind === 'cable') {
    const scale = scales.get(part.id);
    return scale === undefined ? part : scaledCable(part, scale);
  }
  if (part.kind !== 'pair') return part;
  const [plus, minus] = (['plus', 'minus'] as const).map((pole) => scales.get(`${part.id}.${pole}` as PartId));
  return plus === undefined && minus === undefined ? part : scaledPair(part, plus ?? 1, minus ?? 1);
}

function scaledCable(cable: CablePart, scale: number): CablePart {
  const resistanceOhm = cable.resistanceOhm === undefined ? undefined : cable.resistanceOhm * scale;
  return { ...cable, lengthM: cable.lengthM * scale, resistanceOhm };
}

/** A measured resistance is that of each conductor: of two that are scaled otherwise the mean is taken. */
function scaledPair(pair: PairPart, plus: number, minus: number): PairPart {
  const backM = pair.minusLengthM ?? pair.lengthM;
  const resistanceOhm = pair.resistanceOhm === undefined ? undefined : (pair.resistanceOhm * (plus + minus)) / 2;
  return { ...pair, lengthM: pair.lengthM * plus, minusLengthM: backM * minus, resistanceOhm };
}
