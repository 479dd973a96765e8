/** A conductor as an element: its resistance cold, and how that grows as it warms with its own load. */
import { conductorResistance } from '../conductor/resistance.ts';
import { heatingLaw } from '../conductor/temperature.ts';
import { Defect } from '../job/issue.ts';
import type { Practice } from '../job/job.ts';
import type { CablePart } from '../job/part.ts';
import { Memory } from '../tables/memory.ts';
import type { Tables } from '../tables/tables.ts';
import type { Assumption } from './answer.ts';
import { conductorAssumptions, noHeatingAssumption } from './assumptions.ts';

/** v = coldOhm i + warmingOhmPerA2 i^3. */
export interface ConductorModel {
  readonly coldOhm: number;
  readonly warmingOhmPerA2: number;
  /** Conductor temperature: fixed, or ambient + kelvinPerA2 i^2; undefined where the resistance was measured. */
  readonly temperature: { readonly ambientDegC: number; readonly kelvinPerA2: number } | undefined;
  readonly assumptions: readonly Assumption[];
}

export interface ConductorContext {
  readonly practice: Practice;
  /** Of the case; a cable's own goes before it. */
  readonly ambientDegC: number;
  readonly tables: Tables;
  /** Spells out practice and ambient. */
  readonly detail: string;
}

const found = new Memory<CablePart, ConductorModel>();

/**
 * R(T) = R20 (1 + alpha (T - 20)) with T = ambient + rise at rated (I / Iz)^2 gives R = cold + warming I^2. Terminations add to
 * the cold resistance; of conductors in parallel each has its own. Throws a `Defect` for a conductor that `missingFigures` names.
 */
export function conductorModel(cable: CablePart, context: ConductorContext): ConductorModel {
  return found.of(context.tables, cable, context.detail, () => findModel(cable, context));
}

function findModel(cable: CablePart, context: ConductorContext): ConductorModel {
  const endOhm = cable.endOhm / cable.inParallel;
  if (cable.resistanceOhm !== undefined) {
    return { coldOhm: cable.resistanceOhm + endOhm, warmingOhmPerA2: 0, temperature: undefined, assumptions: [] };
  }
  const { practice, tables } = context;
  const conductor = conductorResistance(cable, { practice, tables: tables.conductors });
  if ('missing' in conductor)
    throw new Defect(`figures are checked before a solve (${cable.id}: ${conductor.missing})`);
  const { at20Ohm, alphaPerK } = conductor;
  const ohmAt = (degC: number) => at20Ohm * (1 + alphaPerK * (degC - 20)) + endOhm;
  const assumptions = conductorAssumptions(cable, conductor);
  const ambientDegC = cable.ambientDegC ?? context.ambientDegC;
  const fixed = (degC: number, more: readonly Assumption[] = []): ConductorModel => ({
    coldOhm: ohmAt(degC),
    warmingOhmPerA2: 0,
    temperature: { ambientDegC: degC, kelvinPerA2: 0 },
    assumptions: [...assumptions, ...more],
  });
  if (cable.conductorDegC !== undefined) return fixed(cable.conductorDegC);
  const heating = heatingLaw(cable, { practice, ambientDegC, tables: tables.conductors });
  if ('missing' in heating) return fixed(ambientDegC, [noHeatingAssumption(cable, ambientDegC, heating.missing)]);
  const kelvinPerA2 = heating.riseAtRatedK / (heating.ampacityA * heating.ampacityA);
  return {
    coldOhm: ohmAt(heating.ambientDegC),
    warmingOhmPerA2: at20Ohm * alphaPerK * kelvinPerA2,
    temperature: { ambientDegC: heating.ambientDegC, kelvinPerA2 },
    assumptions,
  };
}
