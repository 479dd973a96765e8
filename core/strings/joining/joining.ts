/** May these two be joined now? The first instant, what limits it, and what follows until both rest. */
import { factsOf, stringSource } from '../../battery/stringSource.ts';
import { type CheckedJob, caseById } from '../../job/job.ts';
import { ambientOf } from '../../network/circuit.ts';
import { missingFigures } from '../../network/figures.ts';
import type { Tables } from '../../tables/tables.ts';
import type { Joining, JoiningLimit, JoiningMoment } from '../answer.ts';
import { joinLimits, ownLimit } from './joinLimits.ts';
import { stringsOfPiece } from './joinPiece.ts';
import { type JoinSide, type JoinSideAsk, type SideContext, sideOf } from './joinSide.ts';
import { type JoinSources, joinSources } from './joinSource.ts';
import { chargesAllowed, isFlatOver } from './restCurve.ts';
import { Settling } from './settling.ts';
import { valueAt } from './straightLine.ts';

export interface JoiningRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly a: JoinSideAsk;
  readonly b: JoinSideAsk;
  /** What joins the two, both ways together, >= 0; else by the drawing, else a guess. */
  readonly leadOhm?: number | undefined;
  /** Replaces all other limits, > 0. */
  readonly limitA?: number | undefined;
  readonly ambientDegC?: number | undefined;
}

/** Two short leads with their clamps, where nothing better is known (common practice, no source). */
const GUESSED_LEAD_OHM = 0.002;
const MOMENTS = 60;
const FIRST_MOMENT_S = 0.1;

/**
 * Two sides joined at rest, neither loaded nor charged: inrush |E_a - E_b| / (R0_a + R0_b + lead) with the resistances of the
 * first instant, then exactly as their polarisation builds up and their rest voltages meet (`Settling`). A side of several
 * strings is its Thévenin source; its charge is shared by capacity. A resistor is answered where the inrush is beyond the least
 * limit. `missing` says what to enter where there is nothing to answer.
 */
export function joiningOf(request: JoiningRequest): Joining | { readonly missing: string } {
  const context = contextOf(request);
  const a = sideOf(request.a, 1, context);
  if ('missing' in a) return a;
  const b = sideOf(request.b, 2, context);
  if ('missing' in b) return b;
  const twice = a.drawn.find((id) => b.drawn.includes(id));
  if (twice !== undefined) return { missing: `two sides without a string in common: "${twice}" is in both` };
  if (request.leadOhm !== undefined && !(request.leadOhm >= 0)) return { missing: 'leadOhm of 0 or more' };
  if (request.limitA !== undefined && !(request.limitA > 0)) return { missing: 'limitA above 0' };
  // The wiring is only asked for where both stand in the drawing.
  const [unknown] = a.drawn.length > 0 && b.drawn.length > 0 ? missingFigures(request) : [];
  if (unknown !== undefined) return { missing: unknown.message };
  return answer(request, context, { a, b });
}

function contextOf({ job, tables, ambientDegC }: JoiningRequest): SideContext {
  const rest = caseById(job, 'at-rest')!;
  return { job, tables: tables.chemistry, ambientDegC: ambientDegC ?? ambientOf(job, rest) };
}

interface Sides {
  readonly a: JoinSide;
  readonly b: JoinSide;
}

function answer(request: JoiningRequest, context: SideContext, sides: Sides): Joining {
  const { a, b } = sides;
  const sources = joinSources(sides, context, request.tables);
  const lead = leadOf(request, sources);
  const direct = new Settling({ ...sources, leadOhm: lead.ohm });
  const [giver, taker] = direct.giver === 'a' ? [a, b] : [b, a];
  const limits = limitsOf(request, context, { giver, taker, sources });
  const { limitA } = limits[0]!;
  const within = direct.inrushA <= limitA;
  const safeGapV = limitA * direct.loopOhm;
  const resistorOhm = within ? 0 : direct.loopOhm * (direct.inrushA / limitA - 1);
  const slowed = within ? null : new Settling({ ...sources, leadOhm: lead.ohm + resistorOhm });
  return {
    a: a.name,
    b: b.name,
    giver: giver.name,
    gapV: valueAt(sources.a.emf, 0) - valueAt(sources.b.emf, 0),
    loopOhm: direct.loopOhm,
    leadOhm: lead.ohm,
    inrushA: direct.inrushA,
    limits,
    limitA,
    safeGapV,
    within,
    settleS: direct.settleS,
    movedAh: direct.movedAh,
    lostWh: direct.lostWh,
    resistor: slowed === null ? null : resistorOf(slowed, { ohm: resistorOhm, limitA, safeGapV }),
    curve: momentsOf(direct, slowed),
    ...flatness(sides, context),
    assumed: [...new Set([...a.assumed, ...b.assumed]), ...lead.assumed, ...emptyText(direct, giver, taker)],
  };
}

function limitsOf(
  request: JoiningRequest,
  { ambientDegC }: SideContext,
  { giver, taker, sources }: { readonly giver: JoinSide; readonly taker: JoinSide; readonly sources: JoinSources },
): readonly JoiningLimit[] {
  const { job, tables, limitA } = request;
  if (limitA !== undefined) return [ownLimit(limitA)];
  const { shares, way } = sources;
  const sides = { giver: giver.piece, taker: taker.piece, shares, passed: way?.passed ?? [] };
  return joinLimits({ job, tables, ambientDegC, ...sides });
}

function leadOf({ leadOhm }: JoiningRequest, { a, b, way }: JoinSources) {
  if (leadOhm !== undefined) return { ohm: leadOhm, assumed: [] };
  // What the drawing has beyond the strings themselves.
  if (way !== undefined) return { ohm: Math.max(0, way.loopOhm - a.instantOhm - b.instantOhm), assumed: way.assumed };
  return { ohm: GUESSED_LEAD_OHM, assumed: ['leadOhm: 2 mΩ taken for what joins the two, a guess (common practice)'] };
}

function bandOf({ piece }: JoinSide, context: SideContext): readonly [number, number] {
  const bands = stringsOfPiece(piece).map((string) => {
    const { emfV } = stringSource(string, { ...context, model: 'fast' });
    return chargesAllowed(factsOf(string, context), emfV.value, context.tables);
  });
  return [Math.min(...bands.map(([low]) => low)), Math.max(...bands.map(([, high]) => high))];
}

function flatness({ a, b }: Sides, context: SideContext): Pick<Joining, 'flat' | 'chargeBand'> {
  const bands = { a: bandOf(a, context), b: bandOf(b, context) };
  const isFlat = ({ piece }: JoinSide, band: readonly [number, number]) =>
    stringsOfPiece(piece).some((string) => isFlatOver(factsOf(string, context), band, context.tables));
  const flat = isFlat(a, bands.a) || isFlat(b, bands.b);
  return { flat, chargeBand: flat ? bands : null };
}

function resistorOf(
  slowed: Settling,
  { ohm, limitA, safeGapV }: { readonly ohm: number; readonly limitA: number; readonly safeGapV: number },
): Joining['resistor'] {
  return {
    ohm,
    w: limitA * limitA * ohm,
    wh: (slowed.heat.squaredA2s * ohm) / 3600,
    untilS: slowed.secondsToGap(safeGapV),
    settleS: slowed.settleS,
  };
}

/** The first instant, then even steps of the logarithm of time until well past both have settled. */
function momentsOf(direct: Settling, slowed: Settling | null): readonly JoiningMoment[] {
  const lastS = Math.max(10 * FIRST_MOMENT_S, 2 * direct.settleS, 2 * (slowed?.settleS ?? 0));
  const step = Math.log(lastS / FIRST_MOMENT_S) / (MOMENTS - 2);
  return Array.from({ length: MOMENTS }, (_, index) => {
    const seconds = index === 0 ? 0 : FIRST_MOMENT_S * Math.exp((index - 1) * step);
    return {
      seconds,
      currentA: direct.currentAt(seconds),
      withResistorA: slowed?.currentAt(seconds) ?? null,
      movedAh: direct.movedAhAt(seconds),
    };
  });
}

function emptyText({ empties }: Settling, giver: JoinSide, taker: JoinSide): readonly string[] {
  if (!empties) return [];
  return [
    `movedAh: ${giver.name} would be empty before the two come to rest; what ${taker.name} cannot keep turns to heat and gas`,
  ];
}
