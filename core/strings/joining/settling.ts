/** Two sides joined: the current from the first instant until both rest, exactly, stretch by stretch of their curves. */
import type { RcElement } from '../../battery/rc.ts';
import { type Loop, type LoopElement, LoopModes } from './loopModes.ts';
import { type StraightLine, sumOfLines, valueAt } from './straightLine.ts';

const COULOMBS_PER_AH = 3600;
/** Charge is said to have moved when this part of it has. */
const SETTLED = 0.95;
/** A smaller gap is what rounding has left of none. */
const DUST_V = 1e-9;

/** What settles: a source behind a resistance, with its polarisation. */
export interface SettlingSide {
  readonly instantOhm: number;
  readonly elements: readonly RcElement[];
  /** x: charge given since the joint was made, C (negative: taken); y: rest voltage. Never rises. */
  readonly emf: StraightLine;
  /** Charge it can give until empty, C. */
  readonly givesC: number;
}

/** A side from its rest-voltage curve: volts against state of charge (rising), and where on it the side stands. */
export function chargeLine(
  curve: StraightLine,
  { capacityAh, stateOfCharge }: { readonly capacityAh: number; readonly stateOfCharge: number },
): StraightLine {
  const capacityC = capacityAh * COULOMBS_PER_AH;
  const line = curve.map(({ x, y }) => ({ x: (stateOfCharge - x) * capacityC, y }));
  line.reverse();
  return line;
}

interface Stretch {
  readonly modes: LoopModes;
  readonly startS: number;
  readonly startC: number;
  /** Infinite for the last, unless one side is empty at its end. */
  readonly seconds: number;
}

/** Heat from the first instant to rest. */
export interface SettlingHeat {
  /** Integral of the current squared, A2 s: heat in each ohm of the loop, J. */
  readonly squaredA2s: number;
  /** In the elements of both sides, J. */
  readonly elementsJ: number;
}

export class Settling {
  /** The one with the higher rest voltage; `a` where they are equal. */
  readonly giver: 'a' | 'b';
  readonly loopOhm: number;
  readonly inrushA: number;
  /** Until both rest, or until the giver is empty. */
  readonly movedC: number;
  /** The giver is empty before both rest. */
  readonly empties: boolean;
  readonly heat: SettlingHeat;
  /** Gap of the rest voltages against charge moved, down to 0. */
  private readonly gap: StraightLine;
  private readonly stretches: readonly Stretch[];

  constructor({ a, b, leadOhm }: { readonly a: SettlingSide; readonly b: SettlingSide; readonly leadOhm: number }) {
    this.giver = valueAt(a.emf, 0) >= valueAt(b.emf, 0) ? 'a' : 'b';
    const [giver, taker] = this.giver === 'a' ? [a, b] : [b, a];
    this.loopOhm = giver.instantOhm + taker.instantOhm + leadOhm;
    this.gap = gapLine(giver, taker);
    this.movedC = this.gap.at(-1)!.x;
    this.empties = this.gap.at(-1)!.y > 0;
    this.inrushA = this.gap[0]!.y / this.loopOhm;
    const loop: Loop = { ohm: this.loopOhm, elements: merged([...giver.elements, ...taker.elements]) };
    this.stretches = stretchesOf(loop, this.gap);
    this.heat = heatOf(loop, this.stretches);
  }

  get movedAh(): number {
    return this.movedC / COULOMBS_PER_AH;
  }

  /** Integral of the gap over the charge moved, Wh: what the stored energies of both sides lose together. */
  get lostWh(): number {
    let joules = 0;
    this.gap.forEach((to, index) => {
      const from = this.gap[index - 1];
      if (from !== undefined) joules += ((from.y + to.y) / 2) * (to.x - from.x);
    });
    return joules / COULOMBS_PER_AH;
  }

  /** Time by which 95 % of the charge has moved. */
  get settleS(): number {
    return this.secondsTo(SETTLED * this.movedC);
  }

  currentAt(seconds: number): number {
    if (seconds <= 0) return this.inrushA;
    const stretch = this.stretchAt(seconds);
    if (stretch === undefined || seconds > stretch.startS + stretch.seconds) return 0;
    return stretch.modes.currentA(seconds - stretch.startS);
  }

  movedAhAt(seconds: number): number {
    const stretch = this.stretchAt(seconds);
    if (stretch === undefined) return 0;
    const since = Math.min(seconds - stretch.startS, stretch.seconds);
    return (stretch.startC + stretch.modes.chargeC(since)) / COULOMBS_PER_AH;
  }

  /** Time at which the rest voltages have come as near as this; 0 where they are, null where they never come. */
  secondsToGap(gapV: number): number | null {
    const index = this.gap.findIndex(({ y }) => y <= gapV);
    if (index < 0) return null;
    if (index === 0) return 0;
    const from = this.gap[index - 1]!;
    const to = this.gap[index]!;
    return this.secondsTo(from.x + ((to.x - from.x) * (from.y - gapV)) / (from.y - to.y));
  }

  /** Time at which this much has moved, C; less than `movedC` unless one side empties. */
  secondsTo(movedC: number): number {
    const stretch = lastOf(this.stretches, ({ startC }) => startC <= movedC);
    if (stretch === undefined) return 0;
    return stretch.startS + timeFor(stretch.modes, movedC - stretch.startC, stretch.seconds);
  }

  private stretchAt(seconds: number): Stretch | undefined {
    return lastOf(this.stretches, ({ startS }) => startS <= seconds);
  }
}

/** The last stretch that has begun. */
function lastOf(stretches: readonly Stretch[], begun: (stretch: Stretch) => boolean): Stretch | undefined {
  const later = stretches.findIndex((stretch) => !begun(stretch));
  return later < 0 ? stretches.at(-1) : stretches[later - 1];
}

/** Falls from the gap at the first instant to 0, or to where the giver is empty. */
function gapLine(giver: SettlingSide, taker: SettlingSide): StraightLine {
  const whole = sumOfLines([
    { line: giver.emf, weight: 1, rate: 1 },
    { line: taker.emf, weight: -1, rate: -1 },
  ]);
  const firstV = valueAt(whole, 0);
  const gap = [{ x: 0, y: firstV > DUST_V ? firstV : 0 }];
  const inside = whole.filter(({ x }) => x > 0 && x < giver.givesC);
  for (const to of [...inside, { x: giver.givesC, y: valueAt(whole, giver.givesC) }]) {
    const from = gap.at(-1)!;
    if (from.y <= 0 || to.x <= from.x) break;
    if (to.y > 0) gap.push(to);
    else gap.push({ x: from.x + ((to.x - from.x) * from.y) / (from.y - to.y), y: 0 });
  }
  return gap;
}

/** Elements of one time are one element; slowest first. */
function merged(elements: readonly RcElement[]): readonly LoopElement[] {
  const byTime = new Map<number, number>();
  for (const { tauS, resistanceOhm } of elements) {
    if (resistanceOhm > 0) byTime.set(tauS, (byTime.get(tauS) ?? 0) + resistanceOhm);
  }
  const each = [...byTime].map(([tauS, resistanceOhm]) => ({ tauS, resistanceOhm }));
  each.sort((one, other) => other.tauS - one.tauS);
  return each;
}

function stretchesOf(loop: Loop, gap: StraightLine): readonly Stretch[] {
  const stretches: Stretch[] = [];
  let elementV: readonly number[] = loop.elements.map(() => 0);
  let startS = 0;
  for (const [index, from] of gap.entries()) {
    const to = gap[index + 1];
    if (to === undefined) break;
    const lengthC = to.x - from.x;
    const modes = new LoopModes(loop, Math.max(0, (from.y - to.y) / lengthC), { gapV: from.y, elementV });
    const seconds = to.y > 0 ? timeFor(modes, lengthC, Number.POSITIVE_INFINITY) : Number.POSITIVE_INFINITY;
    stretches.push({ modes, startS, startC: from.x, seconds });
    elementV = loop.elements.map((_, element) => modes.elementV(element, seconds));
    startS += seconds;
  }
  return stretches;
}

function heatOf({ elements }: Loop, stretches: readonly Stretch[]): SettlingHeat {
  let squaredA2s = 0;
  let elementsJ = 0;
  for (const { modes, seconds } of stretches) {
    squaredA2s += modes.squaredA2s(seconds);
    elements.forEach(({ resistanceOhm }, index) => {
      elementsJ += modes.squaredV2s(index, seconds) / resistanceOhm;
    });
  }
  return { squaredA2s, elementsJ };
}

/** Time in which a stretch moves `chargeC`, at most `mostS`. The charge rises all along, so the time is one: Newton, kept in bounds. */
function timeFor(modes: LoopModes, chargeC: number, mostS: number): number {
  if (chargeC <= 0) return 0;
  let high = chargeC / modes.currentA(0);
  while (modes.chargeC(high) < chargeC && high < mostS && high < Number.MAX_VALUE) high *= 2;
  high = Math.min(high, mostS);
  let low = 0;
  let at = high;
  for (let step = 0; step < 200; step++) {
    const lack = chargeC - modes.chargeC(at);
    if (lack > 0) low = at;
    else high = at;
    const next = at + lack / modes.currentA(at);
    const inside = next > low && next < high ? next : low + (high - low) / 2;
    if (Math.abs(inside - at) <= 1e-14 * at) return inside;
    at = inside;
  }
  return at;
}
