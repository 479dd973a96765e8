/** What a fault at a busbar brings through it against its short-time withstand. */
import type { BusbarPart, PartId } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import { clearingOf, provenance } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import type { Basis } from '../tables/status.ts';
import type { BarFault } from './barFaults.ts';
import { entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { faultsOf, hasWithstand, WITHSTOOD_A } from './faultFigures.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, list, shortList, titleOf, together } from './wording.ts';

const BAR_WITHSTAND: Basis = {
  source: 'SRC-BAR-WITHSTAND',
  text: 'IEC 61439-1, short-time withstand of a bar, I²t of the fault against Icw²·t; up to 10 kA no figure is asked for (10.11.2, of a.c.)',
  status: 'from-memory',
};

export const busbarFault: Rule = {
  id: 'busbar-fault',
  family: 'rating',
  kinds: ['busbar'],
  title: 'Busbar may not stand a fault',
  compares:
    'the square of the most that a bolted fault at each busbar brings, times the longest time that a device round it takes to open (or what a single fuse lets through), with withstandA squared times withstandS',
  remedy: 'Put a current-limiting fuse ahead of the bar, or use a bar of a higher short-time withstand.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => BAR_WITHSTAND,
  run: runBusbarFault,
};

function runBusbarFault(context: CheckContext): RuleOutcome {
  const tally = new Tally(busbarFault, BAR_WITHSTAND);
  const bars = context.drawn.filter((part): part is BusbarPart => part.kind === 'busbar');
  for (const bar of bars) if (hasWithstand(bar)) tally.judge([bar.id], barVerdicts(context, bar));
  judgeUnrated(
    tally,
    bars.filter((bar) => !hasWithstand(bar) && (faultsOf(context).bars.get(bar.id)?.currentA ?? 0) > WITHSTOOD_A),
  );
  return tally.outcome();
}

/** Bars without the figure are one question, asked where a fault brings more than any bar is taken to stand. */
function judgeUnrated(tally: Tally, bars: readonly BusbarPart[]): void {
  if (bars.length === 0) return;
  const ids = bars.map(({ id }) => id);
  const fields = bars.flatMap((bar) =>
    NAMES.filter((name) => bar[name] === undefined).map((name) => wanted(bar, name)),
  );
  const names = NAMES.filter((name) => bars.some((bar) => bar[name] === undefined));
  tally.judge(ids, [missing(`${list(names)} of busbar${ids.length === 1 ? '' : 's'} ${shortList(ids)}`, ...fields)]);
}
const NAMES = ['withstandA', 'withstandS'] as const;

function barVerdicts(context: CheckContext, bar: BusbarPart): readonly Verdict[] {
  const fault = faultsOf(context).bars.get(bar.id);
  if (fault === undefined) return [];
  // What nothing parts from its source is told as such.
  if (fault.bare.length > 0 || fault.devices.length === 0) return [ELSEWHERE];
  const heat = faultHeat(context, fault);
  if ('kind' in heat) return [heat];
  const stands = bar.withstandA! ** 2 * bar.withstandS!;
  if (!isOver(heat.i2t, stands)) return [PASS];
  const [through, held] = apart(heat.i2t, stands, 'A2s');
  return [
    {
      kind: 'fail',
      severity: 'look',
      case: context.cases[0]?.id ?? '',
      measured: { value: heat.i2t, unit: 'A2s' },
      limit: { value: stands, unit: 'A2s' },
      excess: heat.i2t / stands,
      message: `${titleOf(bar)} stands ${held} (${amps(bar.withstandA!)} for ${bar.withstandS!} s); a fault at ${fault.at} brings ${amps(fault.currentA)}, ${through} until ${heat.by.join(' and ')} ${heat.by.length === 1 ? 'has' : 'have'} opened (${heat.words})${faultsOf(context).assumed}.`,
      basis: together(BAR_WITHSTAND, entered(bar, 'withstandA')),
      others: heat.by,
    },
  ];
}

interface Heat {
  readonly i2t: number;
  readonly by: readonly PartId[];
  readonly words: string;
}

function faultHeat(context: CheckContext, { currentA, devices }: BarFault): Heat | Verdict {
  let slowestS = 0;
  let words = '';
  let alone: number | null = null;
  for (const { device: id, currentA: ownA } of devices) {
    const device = context.drawn.find((part): part is Device => part.id === id && isDevice(part))!;
    const band = deviceBandOf(device, context.tables);
    if ('missing' in band)
      return missing(`${band.missing}: when it parts a fault at the bar`, wanted(device, 'curvePoints'));
    const { clearS, letThroughI2t } = clearingOf({ band, currentA: ownA });
    // A device that need not open is told as one that a fault is too weak for.
    if (clearS === null) return ELSEWHERE;
    if (clearS >= slowestS) [slowestS, words] = [clearS, provenance(band)];
    alone = letThroughI2t;
  }
  const i2t = devices.length === 1 && alone !== null ? alone : currentA ** 2 * slowestS;
  return { i2t, by: devices.map(({ device }) => device), words };
}
