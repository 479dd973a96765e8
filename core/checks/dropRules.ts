/** Volts lost between a source and what it feeds, and between a charger and the strings that it charges. */
import type { InverterPart, LoadPart, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { type ChargingPart, chargesIn } from './chargeShare.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { feedersOf } from './feeding.ts';
import type { Judge, Rule, RuleOutcome } from './rule.ts';
import { isOver, missing, missingField, NOMINAL_VOLTS, PASS, Tally, type Verdict } from './tally.ts';
import { apart, list, percent, titleOf, volts, withEdition } from './wording.ts';

export const dropTooBig: Rule = {
  id: 'drop-too-big',
  family: 'voltage',
  kinds: ['load', 'inverter'],
  title: 'Too many volts lost on the way to a load',
  compares:
    'volts at the source less volts at each running load or inverter, as a fraction of nominal volts, with the limit for its class (critical or ordinary), in every case without a starting load',
  remedy: 'Use a thicker or shorter cable, clean up the joints on the way, or go to a higher system voltage.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => withEdition(judge.practice.dropCritical.basis, judge),
  run: (context) => {
    const tally = new Tally(dropTooBig, dropTooBig.basisFor(context));
    for (const drawn of context.drawn) {
      if (drawn.kind !== 'load' && drawn.kind !== 'inverter') continue;
      const verdicts = context.steady.flatMap((one) => {
        const part = one.part(drawn.id) as LoadPart | InverterPart;
        return part.on ? dropVerdict(context, { part, one }) : [];
      });
      tally.judge([drawn.id], verdicts);
    }
    return tally.outcome();
  },
};

function dropVerdict(
  context: CheckContext,
  { part, one }: { part: LoadPart | InverterPart; one: SolvedCase },
): readonly Verdict[] {
  const { voltageV, currentA } = one.answer(part.id);
  // A load that is not fed, has dropped out or is the wrong way round has no drop to judge: other rules tell it.
  if (voltageV === null || voltageV <= 0 || currentA === null || currentA <= 0) return [];
  const feed = feedersOf(one).of(part);
  if (feed === undefined) return [missing(`a source that feeds ${part.kind} ${part.id} in case ${one.id}`)];
  const nominalV = context.volts.nominalBetween(part.plus, part.minus);
  if (nominalV === undefined)
    return [missing(`nominalV in the settings: nominal volts of ${part.kind} ${part.id}`, NOMINAL_VOLTS)];
  const fraction = (feed.volts - voltageV) / nominalV;
  const critical = limitOf(context, 'critical');
  const ordinary = limitOf(context, 'ordinary');
  // An inverter has no drop class: it feeds what it feeds, and has its own cut-off.
  const dropClass = part.kind === 'inverter' ? 'ordinary' : part.dropClass;
  if (!isOver(fraction, Math.min(critical.value, ordinary.value))) return [PASS];
  if (dropClass === undefined && !isOver(fraction, Math.max(critical.value, ordinary.value))) {
    return [
      missingField(
        part,
        'dropClass',
        `: ${percent(fraction)} is more than a critical load may lose (${percent(critical.value)}) and not more than an ordinary one (${percent(ordinary.value)})`,
      ),
    ];
  }
  const judged = dropClass ?? 'ordinary';
  const limit = judged === 'critical' ? critical : ordinary;
  if (!isOver(fraction, limit.value)) return [PASS];
  const [lost, allowed] = apart(fraction, limit.value, '1');
  return [
    {
      kind: 'fail',
      severity: judged === 'critical' ? 'fix' : 'look',
      case: one.id,
      measured: { value: fraction, unit: '1' },
      limit: { value: limit.value, unit: '1' },
      excess: fraction / limit.value,
      message: `${titleOf(part)} gets ${volts(voltageV)} of the ${volts(feed.volts)} at ${list(feed.sources.map(nameOf))}: ${lost} of ${volts(nominalV)} nominal is lost on the way; ${allowed} is allowed for ${judged === 'critical' ? 'a critical' : 'an ordinary'} load.`,
      basis: limit.basis,
    },
  ];
}

/** Volts lost on the way to a load that takes current, as a fraction of nominal volts, with the limit for its class. */
export function dropOf(
  context: CheckContext,
  { part, one }: { readonly part: LoadPart | InverterPart; readonly one: SolvedCase },
): { readonly fraction: number; readonly limit: number } | undefined {
  const { voltageV, currentA } = one.answer(part.id);
  if (!part.on || voltageV === null || voltageV <= 0 || currentA === null || currentA <= 0) return undefined;
  const feed = feedersOf(one).of(part);
  const nominalV = context.volts.nominalBetween(part.plus, part.minus);
  if (feed === undefined || nominalV === undefined) return undefined;
  const dropClass = part.kind === 'inverter' ? 'ordinary' : (part.dropClass ?? 'ordinary');
  return { fraction: (feed.volts - voltageV) / nominalV, limit: limitOf(context, dropClass).value };
}

interface DropLimit {
  readonly value: number;
  readonly basis: Basis;
}

/** The job's own setting, else the practice's figure. */
function limitOf(judge: Judge, dropClass: 'critical' | 'ordinary'): DropLimit {
  const name = dropClass === 'critical' ? 'dropCritical' : 'dropOrdinary';
  const own = judge.job.settings[name];
  const figure = judge.practice[name];
  if (own === undefined || own === figure.value) {
    return { value: figure.value, basis: withEdition(figure.basis, judge) };
  }
  const basis: Basis = {
    source: 'SRC-JOB-ENTRY',
    text: `${name} set in the job; no published source`,
    status: 'common-practice',
  };
  return { value: own, basis };
}

/** Guidance for charge circuits of off-grid systems; a trade article, so no more than practice. */
const CHARGE_DROP = 0.03;
const CHARGE_DROP_BASIS: Basis = {
  source: 'SRC-CHARGE-DROP',
  text: 'trade article on off-grid wiring: 2 to 3 % for array and charge circuits; common practice',
  status: 'common-practice',
};

export const chargeDropTooBig: Rule = {
  id: 'charge-drop-too-big',
  family: 'voltage',
  kinds: ['charger', 'controller'],
  title: 'Too many volts lost between a charger and the strings',
  compares:
    'volts at each charger or controller that gives less volts at each string that takes, diodes on the way included, as a fraction of nominal volts, with 3 %',
  remedy:
    'Use a thicker or shorter charge cable: the charger sees its own volts, so the strings charge late and seldom fill.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => CHARGE_DROP_BASIS,
  run: runChargeDrop,
};

function runChargeDrop(context: CheckContext): RuleOutcome {
  const tally = new Tally(chargeDropTooBig, CHARGE_DROP_BASIS);
  const verdicts = new Map<ChargingPart['id'], Verdict[]>();
  for (const one of context.steady) {
    for (const { charger, strings } of chargesIn(one)) {
      if (charger.kind === 'converter') continue;
      const found = strings.flatMap(({ string }) => chargeDropVerdict(context, { charger, string, one }));
      verdicts.set(charger.id, [...(verdicts.get(charger.id) ?? []), ...found]);
    }
  }
  for (const [id, found] of verdicts) tally.judge([id], found);
  return tally.outcome();
}

function chargeDropVerdict(
  context: CheckContext,
  { charger, string, one }: { charger: ChargingPart; string: StringPart; one: SolvedCase },
): readonly Verdict[] {
  const answer = one.answer(charger.id);
  const [outV, outA] =
    charger.kind === 'charger' ? [answer.voltageV, answer.currentA] : [answer.outputV, answer.outputA];
  const { voltageV: stringV, currentA: stringA } = one.answer(string.id);
  // Judged only while the charger gives and the string takes.
  if (typeof outV !== 'number' || typeof outA !== 'number' || outA <= 0) return [];
  if (stringV === null || stringA === null || stringA >= 0) return [];
  const nominalV = context.volts.nominalBetween(string.plus, string.minus);
  if (nominalV === undefined)
    return [missing(`nominalV in the settings: nominal volts at ${charger.kind} ${charger.id}`, NOMINAL_VOLTS)];
  const fraction = (outV - stringV) / nominalV;
  if (!isOver(fraction, CHARGE_DROP)) return [PASS];
  const [lost, allowed] = apart(fraction, CHARGE_DROP, '1');
  return [
    {
      kind: 'fail',
      severity: 'look',
      case: one.id,
      measured: { value: fraction, unit: '1' },
      limit: { value: CHARGE_DROP, unit: '1' },
      excess: fraction / CHARGE_DROP,
      message: `${titleOf(charger)} gives ${volts(outV)} and ${nameOf(string)} gets ${volts(stringV)}: ${lost} of ${volts(nominalV)} nominal is lost on the way; ${allowed} is usual.`,
      others: [string.id],
    },
  ];
}
