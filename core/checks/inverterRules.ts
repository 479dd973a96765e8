/** Inverter cables and fuses at the lowest battery volts, when the current is largest. */
import type { CablePart, InverterPart } from '../job/part.ts';
import { inverterDcPowerW } from '../network/inverter.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { inSeries } from './seriesWalk.ts';
import { isOver, isUnder, missing, missingField, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, list, percent, titleOf, together, volts, watts, withEdition } from './wording.ts';

export const inverterCable: Rule = {
  id: 'inverter-cable',
  family: 'cable',
  kinds: ['inverter'],
  title: 'Cable or fuse of an inverter not sized for its lowest volts',
  compares:
    'ampacity of every cable, and rating of every fuse and breaker, in series with each inverter with 1.25 (or as set) times P/(efficiency · cutoffV), P its ratedW',
  remedy: 'Size cable and fuse by the current at the lowest volts, not at the nominal ones.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) =>
    withEdition(
      together(
        {
          source: 'SRC-INVERTER-LOW-VOLTS',
          text: 'inverter current at the lowest battery volts, public lesson on stand-alone solar systems (Sandia suggested practice)',
          status: 'published',
        },
        judge.practice.continuousFactor.basis,
      ),
      judge,
    ),
  run: (context) => {
    const tally = new Tally(inverterCable, inverterCable.basisFor(context));
    for (const inverter of context.drawn) {
      if (inverter.kind !== 'inverter') continue;
      if (inverter.cutoffV === undefined) {
        const why = ': at its lowest volts it draws the most';
        tally.judge([inverter.id], [missingField(inverter, 'cutoffV', why)]);
      } else judgeInverter(context, tally, { inverter, drawA: lowestVoltsCurrentA(inverter, inverter.cutoffV) });
    }
    return tally.outcome();
  },
};

/** I = P/(eta · U): rated output, efficiency there (0.9 where not given, as in the network), lowest volts at which it runs. */
export function lowestVoltsCurrentA(inverter: InverterPart, lowestV: number): number {
  return inverterDcPowerW(inverter, inverter.ratedW).powerW / lowestV;
}

interface Draw {
  readonly inverter: InverterPart;
  readonly drawA: number;
}

function judgeInverter(context: CheckContext, tally: Tally, draw: Draw): void {
  const { inverter } = draw;
  const series = [inverter.plus, inverter.minus].flatMap((start) => inSeries(context, start, inverter.id));
  for (const part of new Set(series)) {
    if (part.kind === 'cable') {
      const verdicts = context.cases.map(({ id, ambientDegC }) =>
        cableVerdict(context, draw, { cable: part, id, ambientDegC }),
      );
      tally.judge([part.id, inverter.id], verdicts);
    } else if (isDevice(part)) tally.judge([part.id, inverter.id], [deviceVerdict(context, draw, part)]);
  }
}

function cableVerdict(
  context: CheckContext,
  draw: Draw,
  at: { readonly cable: CablePart; readonly id: string; readonly ambientDegC: number },
): Verdict {
  const { cable } = at;
  const ampacity = context.ampacityOf(cable, at.ambientDegC);
  if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
  const basis = together(inverterCable.basisFor(context), { text: ampacity.basis.text, status: ampacity.status });
  const size = cable.size === undefined ? '' : ` (${sizeText(cable.size)})`;
  return verdict(context, draw, { title: `${titleOf(cable)}${size}`, holdsA: ampacity.finalA, case: at.id, basis });
}

function deviceVerdict(context: CheckContext, draw: Draw, device: Device): Verdict {
  const basis = inverterCable.basisFor(context);
  const id = context.cases[0]?.id ?? '';
  return verdict(context, draw, { title: titleOf(device), holdsA: device.ratingA, case: id, basis });
}

function verdict(
  context: CheckContext,
  { inverter, drawA }: Draw,
  at: { readonly title: string; readonly holdsA: number; readonly case: string; readonly basis: Basis },
): Verdict {
  const { continuousFactor } = context.job.settings;
  const neededA = continuousFactor * drawA;
  if (!isUnder(at.holdsA, neededA)) return PASS;
  const [needed, holds] = apart(neededA, at.holdsA, 'A');
  // Beyond the current itself it is too small; short of the margin only trade practice asks for, a person judges.
  const isSmall = isOver(drawA, at.holdsA) || context.practice.continuousFactor.basis.status !== 'common-practice';
  const assumed = inverter.efficiency === undefined ? [' (efficiency taken as 0.9)'] : [];
  return {
    kind: 'fail',
    severity: isSmall ? 'fix' : 'look',
    case: at.case,
    measured: { value: neededA, unit: 'A' },
    limit: { value: at.holdsA, unit: 'A' },
    excess: at.holdsA > 0 ? neededA / at.holdsA : Number.POSITIVE_INFINITY,
    message: `${at.title} is good for ${holds}; inverter ${inverter.id} draws ${amps(drawA)} for ${watts(inverter.ratedW)} at ${volts(inverter.cutoffV ?? 0)}${list(assumed)}, and ${percent(continuousFactor)} of that is ${needed}.`,
    basis: at.basis,
  };
}
