/** Fuses and breakers while a load or inverter starts. */
import type { InverterPart, LoadPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import { timeText } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { surgeAgainstMelt } from '../protection/pulse.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { startedPoint } from './surgeRules.ts';
import { ELSEWHERE, isOver, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { amps, titleOf, together } from './wording.ts';

const MELT_METHOD: Basis = {
  source: 'SRC-PRACTICE',
  text: 'surge of so many amperes and seconds against the shortest melting time of the fuse, common practice, no source',
  status: 'common-practice',
};

export const nuisanceBlow: Rule = {
  id: 'nuisance-blow',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker may open while a load starts',
  compares:
    'current in each fuse and breaker while each load and inverter with a surgeW starts on top of each case: within its rating it passes; above, surgeS with the time that the device surely holds that current',
  remedy: 'Use a slower or larger fuse, checking the cable again.',
  byPractice: false,
  reads: 'every-case',
  basisFor: () => MELT_METHOD,
  run: (context) => {
    const tally = new Tally(nuisanceBlow, MELT_METHOD);
    const starts = context.cases.flatMap((one) => startsIn(context, one));
    for (const device of context.drawn) {
      if (!isDevice(device)) continue;
      tally.judge(
        [device.id],
        starts.flatMap((start) => startVerdict(context, start, start.one.part(device.id) as Device)),
      );
    }
    return tally.outcome();
  },
};

/** No fuse or breaker opens within a start at so many times its rating: conventional currents begin at 1.05 to 1.1; common practice. */
const SURELY_HELD = 1.05;

interface Start {
  readonly part: LoadPart | InverterPart;
  readonly one: SolvedCase;
  readonly surgeW: number;
}

/** What can start on top of a case; in a case with a start of its own, that one. */
export function startsIn(context: CheckContext, one: SolvedCase): readonly Start[] {
  return context.drawn.flatMap((drawn): readonly Start[] => {
    if (drawn.kind !== 'load' && drawn.kind !== 'inverter') return [];
    const part = one.part(drawn.id) as LoadPart | InverterPart;
    const startsOther = one.isStarting && one.operatingCase.surge !== drawn.id;
    if (!part.on || part.surgeW === undefined || startsOther || one.point.outcome === 'unsupplied') return [];
    return [{ part, one, surgeW: part.surgeW }];
  });
}

function startVerdict(context: CheckContext, start: Start, device: Device): readonly Verdict[] {
  const { one } = start;
  if (device.state === 'open') return [];
  const point = startedPoint(context, start);
  // A start that the wiring cannot bring is told by the rule about sagging volts.
  if (point.outcome !== 'solved') return [ELSEWHERE];
  const currentA = point.parts.get(device.id)?.currentA;
  if (typeof currentA !== 'number') return [];
  const surgeA = Math.abs(currentA);
  if (!isOver(surgeA, SURELY_HELD * device.ratingA)) return [PASS];
  const runningA = one.isStarting ? 0 : Math.abs(one.answer(device.id).currentA ?? 0);
  if (isOver(runningA, device.ratingA)) return [ELSEWHERE];
  return [againstBand(context, start, { device, surgeA })];
}

function againstBand(
  context: CheckContext,
  { part, one }: Start,
  { device, surgeA }: { readonly device: Device; readonly surgeA: number },
): Verdict {
  const { surgeS } = part;
  // Without the amperes, which differ from case to case: it is one question.
  const why = `: does ${device.kind} ${device.id} hold while it starts?`;
  if (surgeS === undefined) return missingField(part, 'surgeS', why);
  const band = deviceBandOf(device, context.tables);
  if ('missing' in band) {
    const name = band.missing.startsWith('type') ? 'type' : 'curvePoints';
    return missing(`${band.missing}: does it hold while ${part.id} starts?`, wanted(device, name));
  }
  const { holds, holdS, text } = surgeAgainstMelt({ band, currentA: surgeA, durationS: surgeS }, context.tables);
  if (holds === true) return PASS;
  if (holdS === null) {
    const gap = `curvePoints of ${device.kind} ${device.id}: does it hold while ${part.id} starts?`;
    return missing(gap, wanted(device, 'curvePoints'));
  }
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: surgeS, unit: 's' },
    limit: { value: holdS, unit: 's' },
    excess: holdS > 0 ? surgeS / holdS : Number.POSITIVE_INFINITY,
    message: `${titleOf(device)}, ${amps(device.ratingA)}, carries ${amps(surgeA)} for ${timeText(surgeS)} while ${nameOf(part)} starts and may open: ${text}.`,
    basis: together(MELT_METHOD, band.basis),
    others: [part.id],
  };
}
