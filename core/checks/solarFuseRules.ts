/** Fuses of array strings, and the way back from the battery to the array. */
import type { ArrayPart, CablePart, ControllerPart, DiodePart, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { type Device, isDevice, netsOf, throughDiodes, type WiringPart } from '../network/wiring.ts';
import type { SolarPractice } from '../tables/practiceTable.ts';
import { arrayIscA, chainsBetween } from './arrayCircuits.ts';
import { COMMON_PRACTICE, entered } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { inSeries } from './seriesWalk.ts';
import { isOver, isUnder, missing, missingField, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together, withEdition } from './wording.ts';

/**
 * Strings side by side drive each other backwards when one is shorted or shaded: (n − 1) · 1.25 Isc into one. A fuse in each is
 * asked for where the modules (and, for strings drawn one by one, their cables) do not stand that; a fuse that is there is to
 * hold what its string gives and to be no larger than the modules allow.
 */
export const pvStringFuse: Rule = {
  id: 'pv-string-fuse',
  family: 'solar',
  kinds: ['array'],
  title: 'Strings of an array without the fuses that they need',
  compares:
    "current that all other strings can drive backwards into one (1.25 of their iscA) with what its modules' maxFuseA admits by the practice and with its own cables; rating of a string's own fuse with the window of the practice and maxFuseA",
  remedy:
    'Fit a fuse rated for direct current in each string, between what the string gives with its margin and the largest fuse of the module; draw each string as an array of its own with its fuse.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.solar.moduleFuseFactor.basis, judge),
  run: (context) => {
    const tally = new Tally(pvStringFuse, pvStringFuse.basisFor(context));
    for (const array of context.drawn) {
      if (array.kind !== 'array') continue;
      tally.judge([array.id], [stringVerdict(context, array)].flat());
    }
    return tally.outcome();
  },
};

interface StringPlace {
  readonly array: ArrayPart;
  /** Strings side by side, this part's and the others'. */
  readonly strings: number;
  /** Backwards into one string: from its neighbours in the same part, and from other parts, which a device of its own stops. */
  readonly withinA: number;
  readonly outsideA: number;
  readonly series: readonly WiringPart[];
  readonly device: Device | undefined;
}

function placeOf(context: CheckContext, array: ArrayPart): StringPlace {
  const factor = context.practice.solar.currentFactor.value;
  const beside = chainsBetween(context, array).flatMap((chain) => (chain.length === 1 ? chain : []));
  const others = beside.filter(({ id }) => id !== array.id);
  const series = [array.plus, array.minus].flatMap((start) => inSeries(context, start, array.id));
  return {
    array,
    strings: beside.reduce((sum, { stringsInParallel }) => sum + stringsInParallel, 0),
    withinA: factor * (array.stringsInParallel - 1) * array.iscA,
    outsideA: factor * others.reduce((sum, other) => sum + arrayIscA(other), 0),
    series,
    device: series.find(isDevice),
  };
}

function stringVerdict(context: CheckContext, array: ArrayPart): Verdict | readonly Verdict[] {
  const place = placeOf(context, array);
  const { device } = place;
  const unfused = unfusedVerdict(context, place);
  return device === undefined ? unfused : [unfused, windowVerdict(context, place, device)];
}

/** Do the modules and cables of one string stand what comes backwards past its device, if it has one? */
function unfusedVerdict(context: CheckContext, place: StringPlace): Verdict {
  const { array, strings, device } = place;
  const { solar } = context.practice;
  const isOwn = device !== undefined && array.stringsInParallel === 1;
  const backA = place.withinA + (device === undefined ? place.outsideA : Math.min(place.outsideA, device.ratingA));
  if (isOwn || backA <= 0 || strings < (solar.fuseFromStrings?.value ?? 0)) return PASS;
  if (array.maxFuseA === undefined)
    return missingField(array, 'maxFuseA', ': the largest fuse printed for its modules');
  const limitA = solar.moduleFuseFactor.value * array.maxFuseA;
  if (!isOver(backA, limitA)) return place.outsideA > 0 ? cableVerdict(context, place) : PASS;
  const [back, limit] = apart(backA, limitA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: backA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: backA / limitA,
    message: `${titleOf(array)}: of ${strings} strings side by side the others can drive ${back} backwards into one, and its modules stand ${limit} without a fuse in each string${windowWords(context, array)}.`,
    basis: together(pvStringFuse.basisFor(context), solar.currentFactor.basis, entered(array, 'maxFuseA')),
  };
}

function windowWords({ practice: { solar } }: CheckContext, { iscA, maxFuseA }: ArrayPart): string {
  const lowA = solar.fuseLowFactor.value * iscA;
  const highA = highestFuseA(solar, iscA, maxFuseA);
  return isOver(lowA, highA)
    ? `; no fuse fits: it should be at least ${amps(lowA)}, and the modules allow ${amps(highA)}`
    : `; a fuse between ${amps(lowA)} and ${amps(highA)} in each would do`;
}

function highestFuseA({ fuseHighFactor }: SolarPractice, iscA: number, maxFuseA: number | undefined): number {
  return Math.min(maxFuseA ?? Number.POSITIVE_INFINITY, (fuseHighFactor?.value ?? Number.POSITIVE_INFINITY) * iscA);
}

/** A string drawn by itself and without a device: its own cables carry what comes back. */
function cableVerdict(context: CheckContext, { array, outsideA, series }: StringPlace): Verdict {
  const cables = series.filter((part): part is CablePart => part.kind === 'cable');
  for (const cable of cables) {
    const ampacity = context.ampacityOf(cable, hottestDegC(context));
    if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
    if (!isOver(outsideA, ampacity.finalA)) continue;
    const [back, carries] = apart(outsideA, ampacity.finalA, 'A');
    return {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: outsideA, unit: 'A' },
      limit: { value: ampacity.finalA, unit: 'A' },
      excess: outsideA / ampacity.finalA,
      message: `${titleOf(array)}: the strings beside it can drive ${back} backwards into it, and its cable ${cable.id} may carry ${carries}.`,
      basis: together(pvStringFuse.basisFor(context), { text: ampacity.basis.text, status: ampacity.status }),
      others: [cable.id],
    };
  }
  return PASS;
}

function hottestDegC({ cases }: CheckContext): number {
  return Math.max(...cases.map(({ ambientDegC }) => ambientDegC));
}

/** low · Isc ≤ In ≤ the module's largest fuse; where a string fuse is asked for, the upper factor of the book as well. */
function windowVerdict(context: CheckContext, { array, strings }: StringPlace, device: Device): Verdict {
  const { solar } = context.practice;
  const isString = array.stringsInParallel === 1 && strings > 1;
  const lowA = solar.fuseLowFactor.value * arrayIscA(array);
  const highA = isString ? highestFuseA(solar, array.iscA, array.maxFuseA) : Number.POSITIVE_INFINITY;
  const isLow = isUnder(device.ratingA, lowA);
  if (!isLow && !isOver(device.ratingA, highA)) {
    return isString && array.maxFuseA === undefined
      ? missingField(array, 'maxFuseA', ': the largest fuse printed for its modules')
      : PASS;
  }
  const limitA = isLow ? lowA : highA;
  const [rated, limit] = apart(device.ratingA, limitA, 'A');
  const bound = isLow ? solar.fuseLowFactor : (solar.fuseHighFactor ?? solar.moduleFuseFactor);
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: device.ratingA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: isLow ? limitA / device.ratingA : device.ratingA / limitA,
    message: isLow
      ? `${titleOf(device)}, ${rated}, is in the lead of ${array.id}, which gives ${amps(arrayIscA(array))} by its label: it should be ${limit} at least, or it opens on a bright day.`
      : `${titleOf(device)}, ${rated}, is the string fuse of ${array.id}; ${limit} is the most for its modules.`,
    remedy: isLow
      ? 'Fit the next standard size at or above the least rating, within the largest fuse of the module.'
      : 'Fit a smaller string fuse, still above what the string gives with its margin.',
    basis: withEdition(bound.basis, context),
    others: [device.id],
  };
}

export const pvWrongWay: Rule = {
  id: 'pv-wrong-way',
  family: 'solar',
  kinds: ['array'],
  title: 'Battery can feed back into the array',
  compares:
    'for each array: do closed wiring and diodes lead from the plus of a string to its plus with no controller and no blocking diode in between; does the controller behind it block at night (blocksAtNight)? Crossed leads are told by another rule',
  remedy: 'Confirm that the controller blocks at night, or put a blocking diode into the plus lead of the array.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => COMMON_PRACTICE,
  run: (context) => {
    const tally = new Tally(pvWrongWay, COMMON_PRACTICE);
    const paths = pathsOf(context);
    for (const array of context.drawn) {
      if (array.kind !== 'array') continue;
      const way = wayBack(context, paths, array);
      if (way !== undefined) tally.judge([array.id], [way]);
    }
    return tally.outcome();
  },
};

interface Paths {
  /** Junctions joined with every switch and device closed, diodes left out. */
  readonly nets: CheckContext['nets'];
  readonly diodes: readonly DiodePart[];
}

function pathsOf({ drawn }: CheckContext): Paths {
  return {
    nets: netsOf(drawn, (part) => part.kind !== 'diode'),
    diodes: drawn.filter((part): part is DiodePart => part.kind === 'diode'),
  };
}

/** `undefined` for an array that neither a string nor a controller meets. */
function wayBack(context: CheckContext, paths: Paths, array: ArrayPart): Verdict | undefined {
  const feeds = (plus: ArrayPart['plus'], minus: ArrayPart['plus']) =>
    throughDiodes(paths.nets.of(plus)!, 'along', paths).has(paths.nets.of(array.plus)!) &&
    throughDiodes(paths.nets.of(minus)!, 'against', paths).has(paths.nets.of(array.minus)!);
  const strings = context.drawn.filter((part) => part.kind === 'string');
  const string = strings.find(({ plus, minus }) => feeds(plus, minus));
  if (string !== undefined) {
    return feedsBack(
      context,
      [array, string],
      `nothing blocks the way from string ${nameOf(string)} back into it at night`,
    );
  }
  const controllers = context.drawn.filter((part): part is ControllerPart => part.kind === 'controller');
  const own = controllers.filter(({ from }) => chainsBetween(context, from).some((chain) => chain.includes(array)));
  const leaks = own.filter(({ from }) => feeds(from.plus, from.minus));
  const open = leaks.find(({ blocksAtNight }) => blocksAtNight === false);
  if (open !== undefined) {
    const what = `controller ${nameOf(open)} does not block at night, and no diode lies between them`;
    return feedsBack(context, [array, open], what);
  }
  const unsaid = leaks.find(({ blocksAtNight }) => blocksAtNight === undefined);
  if (unsaid !== undefined)
    return missingField(unsaid, 'blocksAtNight', `: does it keep the battery from array ${array.id} at night?`);
  // An array on its strings through a blocking diode, or behind a controller that blocks.
  return own.length > 0 || strings.some(({ plus }) => context.nets.same(plus, array.plus)) ? PASS : undefined;
}

function feedsBack(
  context: CheckContext,
  [array, other]: readonly [ArrayPart, { readonly id: PartId }],
  what: string,
): Verdict {
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: 1,
    message: `${titleOf(array)}: ${what}.`,
    others: [other.id],
  };
}
