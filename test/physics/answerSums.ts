/**
 * Kirchhoff's current rule and the balance of power, summed again from an answer: nothing here reads the answer's own proof.
 */
import { partsInCase } from '../../core/api.ts';
import { cablesOfPair, type JunctionId, type Part } from '../../core/job/part.ts';
import { Groups } from './denseScreening.ts';
import type { Answered } from './solveValue.ts';

/** Amps that a part draws from a junction; null where the answer leaves them open. */
interface Terminal {
  readonly junction: JunctionId;
  readonly amps: number | null;
}

/** A way through a part: what goes in at one end comes out at the other. */
interface Through {
  readonly from: JunctionId;
  readonly to: JunctionId;
  readonly amps: number | null;
}

/** Every way through every part, with the current that the answer gives it. */
function throughs({ job, operatingCase, point }: Answered): readonly Through[] {
  const current = (id: string): number | null => {
    const answer = point.parts.get(id as Part['id']);
    if (answer === undefined) throw new Error(`no answer about ${id}`);
    return answer.currentA;
  };
  return partsInCase(job, operatingCase).flatMap((part): readonly Through[] => {
    const answer = point.parts.get(part.id);
    switch (part.kind) {
      case 'pair':
        return cablesOfPair(part).map(({ id, from, to }) => ({ from, to, amps: current(id) }));
      case 'busbar':
        return part.junctions.slice(1).map((to, k) => ({ from: part.junctions[k]!, to, amps: answer!.segmentsA![k]! }));
      case 'string':
        return halves(part, { upperA: current(part.id), point });
      case 'array':
      case 'charger':
        return [{ from: part.minus, to: part.plus, amps: current(part.id) }];
      case 'load':
      case 'inverter':
        return [{ from: part.plus, to: part.minus, amps: current(part.id) }];
      case 'controller':
      case 'converter':
        return [
          { from: part.from.plus, to: part.from.minus, amps: answer!.inputA! },
          { from: part.to.minus, to: part.to.plus, amps: answer!.outputA! },
        ];
      default:
        return [{ from: part.from, to: part.to, amps: current(part.id) }];
    }
  });
}

/** A tapped string answers the current out of its plus; that of its lower half follows from that half's own law. */
function halves(
  string: Extract<Part, { kind: 'string' }>,
  at: { readonly upperA: number | null; readonly point: Answered['point'] },
): readonly Through[] {
  const { plus, minus, midpoint, emfV, resistanceOhm, linkOhm } = string;
  if (midpoint === undefined) return [{ from: minus, to: plus, amps: at.upperA }];
  const volts = at.point.junctions.get(midpoint)! - at.point.junctions.get(minus)!;
  const lowerA = (emfV! / 2 - volts) / ((resistanceOhm! + linkOhm) / 2);
  return [
    { from: minus, to: midpoint, amps: lowerA },
    { from: midpoint, to: plus, amps: at.upperA },
  ];
}

/** Where currents are left open between junctions, the rule is summed over all of those together. */
export function worstRemainder(answer: Answered): { readonly perAmp: number; readonly at: string } {
  const ways = throughs(answer);
  const together = new Groups<JunctionId>();
  for (const { from, to, amps } of ways) if (amps === null) together.join(from, to);
  const terminals = ways.flatMap(({ from, to, amps }): readonly Terminal[] =>
    amps === null
      ? []
      : [
          { junction: from, amps },
          { junction: to, amps: -amps },
        ],
  );
  const sums = new Map<JunctionId, { sum: number; size: number }>();
  for (const { junction, amps } of terminals) {
    const at = together.head(junction);
    const { sum, size } = sums.get(at) ?? { sum: 0, size: 0 };
    sums.set(at, { sum: sum + amps!, size: size + Math.abs(amps!) });
  }
  let worst = { perAmp: 0, at: '' };
  for (const [at, { sum, size }] of sums) {
    const perAmp = Math.abs(sum) / Math.max(1, size);
    if (!(perAmp <= worst.perAmp)) worst = { perAmp, at };
  }
  return worst;
}

/** Power as the parts' answers state it, and as volts times amps of the answer give it. */
export interface PowerBalance {
  readonly deliveredW: number;
  readonly mismatchW: number;
  /** Largest gap between a part's stated power and its own volts times amps. */
  readonly worstPartW: number;
  readonly worstPart: string;
  /** Watts that pass through the network: the scale of all of these. Never less than 1 A at the largest volts would carry. */
  readonly throughputW: number;
}

const SOURCES: ReadonlySet<string> = new Set(['string', 'array', 'charger']);

export function powerBalance(answer: Answered): PowerBalance {
  const { job, operatingCase, point } = answer;
  let deliveredW = 0;
  let takenW = 0;
  let throughputW = Math.max(1, ...[...point.junctions.values()].map((volts) => Math.abs(volts ?? 0)));
  let worst = { worstPartW: 0, worstPart: '' };
  for (const part of partsInCase(job, operatingCase)) {
    const answers = part.kind === 'pair' ? cablesOfPair(part).map(({ id }) => id) : [part.id];
    const statedW = answers.reduce((sum, id) => sum + (point.parts.get(id)?.powerW ?? 0), 0);
    const { absorbedW, handledW } = ownPower(part, answer);
    throughputW += handledW / 2;
    if (SOURCES.has(part.kind)) deliveredW += statedW;
    else takenW += statedW;
    const gap = Math.abs((SOURCES.has(part.kind) ? -absorbedW : absorbedW) - statedW);
    if (!(gap <= worst.worstPartW)) worst = { worstPartW: gap, worstPart: part.id };
  }
  return { deliveredW, mismatchW: deliveredW - takenW, throughputW, ...worst };
}

/** Volts times amps summed over the ways through a part; open currents run through parts of no volts. */
function ownPower(part: Part, answer: Answered): { readonly absorbedW: number; readonly handledW: number } {
  const alone = { ...answer, job: { ...answer.job, parts: [part] } };
  let absorbedW = 0;
  let handledW = 0;
  for (const { from, to, amps } of throughs(alone)) {
    if (amps === null || amps === 0) continue;
    const watts = (answer.point.junctions.get(from)! - answer.point.junctions.get(to)!) * amps;
    absorbedW += watts;
    handledW += Math.abs(watts);
  }
  return { absorbedW, handledW };
}

/** Every number anywhere in an answer that is not a finite one. */
export function badNumbers(value: unknown, path = ''): readonly string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} = ${value}`];
  if (value === null || typeof value !== 'object') return [];
  const entries = value instanceof Map ? [...value] : Object.entries(value);
  return entries.flatMap(([key, inner]) => badNumbers(inner, `${path}/${String(key)}`));
}
