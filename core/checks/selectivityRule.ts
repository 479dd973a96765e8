/** Whether the nearer of two devices in series opens alone. */
import type { Device } from '../network/wiring.ts';
import { type Selectivity, selectivityOf } from '../protection/selectivity.ts';
import type { CheckContext } from './checkContext.ts';
import { faultsOf } from './faultFigures.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { type SeriesPair, seriesPairs } from './seriesDevices.ts';
import { missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { field, titleOf } from './wording.ts';

export const tripsTogether: Rule = {
  id: 'trips-together',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'A fault may open the device farther up too',
  compares:
    'each fuse and breaker with every one ahead of it that serves more: melting heat of the farther with the total let-through of the nearer where both are known, else their curves, else the ratio of the ratings (1.6 for two gG, 2 for others)',
  remedy: 'Widen the ratio of the two ratings, or use two types with published selectivity.',
  byPractice: false,
  reads: 'drawing',
  basisFor: ({ tables }) => tables.devices.selectivity.others.basis,
  run: runTripsTogether,
};

/** One verdict for each device ahead; a device is told once, with the worst of them. */
function runTripsTogether(context: CheckContext): RuleOutcome {
  const tally = new Tally(tripsTogether, tripsTogether.basisFor(context));
  const byNearer = new Map<Device, SeriesPair[]>();
  for (const pair of seriesPairs(context)) {
    byNearer.set(pair.downstream, [...(byNearer.get(pair.downstream) ?? []), pair]);
  }
  for (const [{ id }, pairs] of byNearer) {
    tally.judge(
      [id],
      pairs.map((pair) => pairVerdict(context, pair)),
    );
  }
  return tally.outcome();
}

function pairVerdict(context: CheckContext, { upstream, downstream }: SeriesPair): Verdict {
  const faultA = faultsOf(context).devices.get(downstream.id)?.highestA ?? null;
  const { selective, ratio, needed, by, text, basis } = selectivityOf({ upstream, downstream, faultA }, context.tables);
  if (selective === true) return PASS;
  if (selective === null) {
    const unknown = [upstream, downstream].filter((device) => device.curvePoints === undefined);
    const what = unknown.map((device) => field(device, 'curvePoints')).join(' and ');
    return missing(
      `${what}: whether ${downstream.id} opens before ${upstream.id} (${text})`,
      ...unknown.map((device) => wanted(device, 'curvePoints')),
    );
  }
  const { measured, limit } = figuresBy({ upstream, downstream }, { ratio, needed, by });
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured,
    limit,
    excess: measured.value > 0 ? Math.max(1, limit.value / measured.value) : 1,
    message: `${titleOf(downstream)} and ${upstream.kind} ${upstream.id} ahead of it may both open in one fault: ${text}.`,
    basis,
    others: [upstream.id],
  };
}

/** What decided: the ratio of the ratings, or the heat that melts the farther against what the nearer lets through. */
function figuresBy(
  { upstream, downstream }: SeriesPair,
  { ratio, needed, by }: Pick<Selectivity, 'ratio' | 'needed' | 'by'>,
) {
  if (by !== 'heat') return { measured: { value: ratio, unit: '' }, limit: { value: needed, unit: '' } };
  const [melts, through] = [upstream.preArcI2t ?? 0, downstream.totalI2t ?? 0];
  return { measured: { value: melts, unit: 'A2s' }, limit: { value: through, unit: 'A2s' } };
}
