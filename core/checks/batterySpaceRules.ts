/** The space around batteries that give off gas: enough air, and nothing in it that sparks; and sparks near petrol. */
import { cellsPerBlock } from '../battery/cells.ts';
import { sparkDistanceMm, ventilation } from '../battery/ventilation.ts';
import type { Chemistry, StringPart } from '../job/part.ts';
import type { Device, SinglePart } from '../network/wiring.ts';
import type { GassingCurrent } from '../tables/chemistryTables.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { askOfSite, askOnce, fact, isAsked } from './flags.ts';
import type { Rule } from './rule.ts';
import { isUnder, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { field, list, shortList, titleOf, together } from './wording.ts';

/** Kinds of cell as the standard names them. Lithium cells give off no gas while they are sound. */
const GASSING: Readonly<Partial<Record<Chemistry, string>>> = {
  flooded: 'vented lead-acid Sb<3 %',
  agm: 'valve-regulated lead-acid',
  gel: 'valve-regulated lead-acid',
  nicd: 'vented NiCd',
};

/** The gassing current while the string is charged hard, which is when it gasses most. */
function gassingOf({ tables }: Pick<CheckContext, 'tables'>, string: StringPart): GassingCurrent | undefined {
  const cellType = GASSING[string.chemistry];
  return tables.chemistry.gassing.find((row) => row.cellType === cellType && row.mode === 'boost');
}

interface Gassing {
  readonly string: StringPart;
  readonly current: GassingCurrent;
}

/** Strings that gas, by the box that they stand in; those of which no box is named stand together. */
function spaces(context: CheckContext): readonly (readonly Gassing[])[] {
  const found = new Map<string, Gassing[]>();
  for (const string of context.drawn) {
    if (string.kind !== 'string') continue;
    const current = gassingOf(context, string);
    if (current === undefined) continue;
    const key = string.enclosure ?? '';
    found.set(key, [...(found.get(key) ?? []), { string, current }]);
  }
  return [...found.values()];
}

export const gasNoVent: Rule = {
  id: 'gas-no-vent',
  family: 'battery',
  kinds: ['string'],
  title: 'Battery space without enough air',
  compares:
    'ventAirM3PerH with Q = 0.05 · cells · gassing current · capacity, or ventOpeningCm2 (of inlet and outlet each) with 28 Q, for each space of lead or nickel-cadmium strings at boost charge',
  remedy: 'Add an inlet low down and an outlet high up, each straight to outside air.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('gas-no-vent', judge),
  run: (context) => {
    const tally = new Tally(gasNoVent, gasNoVent.basisFor(context));
    for (const space of spaces(context)) {
      tally.judge(
        space.map(({ string }) => string.id),
        [ventVerdict(context, space)],
      );
    }
    return tally.outcome();
  },
};

function ventVerdict(context: CheckContext, space: readonly Gassing[]): Verdict {
  const need = { airM3PerH: 0, openingCm2: 0 };
  for (const { string, current } of space) {
    const count = cellsPerBlock(string.chemistry, string.blockNominalV, context.tables.chemistry);
    if (!count.known) return missing(`${count.missing} (string ${string.id})`, wanted(string, 'blockNominalV'));
    const cells = count.cells * string.blocksInSeries;
    const { airM3PerH, openingCm2 } = ventilation({
      cells,
      capacityAh: string.capacityAh,
      milliampPerAh: current.milliampPerAh,
    });
    need.airM3PerH += airM3PerH;
    need.openingCm2 += openingCm2;
  }
  const airM3PerH = leastOf(space.flatMap(({ string }) => string.ventAirM3PerH ?? []));
  const openingCm2 = leastOf(space.flatMap(({ string }) => string.ventOpeningCm2 ?? []));
  if (airM3PerH !== undefined && !isUnder(airM3PerH, need.airM3PerH)) return PASS;
  if (openingCm2 !== undefined && !isUnder(openingCm2, need.openingCm2)) return PASS;
  const first = space[0]!.string;
  if (airM3PerH === undefined && openingCm2 === undefined) {
    const needed = `${areaText(need.openingCm2)} in and out each, or ${airText(need.airM3PerH)}, is needed`;
    return missing(
      `${field(first, 'ventOpeningCm2')} or its ventAirM3PerH: ${needed}`,
      wanted(first, 'ventOpeningCm2'),
      wanted(first, 'ventAirM3PerH'),
    );
  }
  const isByOpening = openingCm2 !== undefined;
  const [has, needs] = isByOpening ? [openingCm2, need.openingCm2] : [airM3PerH!, need.airM3PerH];
  const text = isByOpening ? areaText : airText;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: has, unit: isByOpening ? 'cm2' : 'm3/h' },
    limit: { value: needs, unit: isByOpening ? 'cm2' : 'm3/h' },
    excess: has > 0 ? needs / has : Number.POSITIVE_INFINITY,
    message: `The space of ${list(space.map(({ string }) => string.id))} has ${text(has)}${isByOpening ? ' of opening in and out each' : ' of air'}; at boost charge it needs ${text(needs)}, so that hydrogen stays thin.`,
    basis: together(clauseOf('gas-no-vent', context), ...space.map(({ current }) => current.basis)),
  };
}

const areaText = (value: number) => formatQuantity({ value, unit: 'cm2' });
const airText = (value: number) => formatQuantity({ value, unit: 'm3/h' });

function leastOf(figures: readonly number[]): number | undefined {
  return figures.length === 0 ? undefined : Math.min(...figures);
}

type Sparking = Device | Extract<SinglePart, { readonly kind: 'switch' | 'charger' }>;
const SPARKING: ReadonlySet<SinglePart['kind']> = new Set<Sparking['kind']>(['fuse', 'breaker', 'switch', 'charger']);

export const sparkNearGas: Rule = {
  id: 'spark-near-gas',
  family: 'battery',
  kinds: ['fuse', 'breaker', 'switch', 'charger'],
  title: 'Part that sparks near battery gas or petrol',
  compares:
    'each fuse, breaker, switch and charger: does it stand in the space of a battery that gives off gas, or on a site with petrol in a closed space, without ignition protection',
  remedy: 'Move the part out of the space, or use an ignition-protected type.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('spark-near-gas', judge),
  run: (context) => {
    const tally = new Tally(sparkNearGas, sparkNearGas.basisFor(context));
    const strings = spaces(context).flat();
    const { gasolineSpace } = context.job.site;
    const parts = context.drawn.filter((part): part is Sparking => SPARKING.has(part.kind));
    const noPlace: Sparking[] = [];
    const noProtection: Sparking[] = [];
    for (const part of parts) {
      const place = strings.length === 0 ? false : isInSpace(part, strings);
      if (part.ignitionProtected === true) tally.judge([part.id], [PASS]);
      else if (part.ignitionProtected === undefined && (place === true || gasolineSpace === true))
        noProtection.push(part);
      else if (gasolineSpace === true) tally.judge([part.id], [petrolFailure(context, part)]);
      else if (place === true) tally.judge([part.id], [gasFailure(context, part, strings)]);
      else if (place === undefined) noPlace.push(part);
      else if (strings.length > 0) tally.judge([part.id], [PASS]);
    }
    askOnce(tally, noProtection, 'ignitionProtected');
    askPlace(tally, noPlace, strings);
    if (gasolineSpace === undefined && parts.length > 0 && isAsked(context, 'spark-near-petrol')) {
      const asked = parts.filter(({ ignitionProtected }) => ignitionProtected !== true);
      const words = `gasolineSpace of the site: is there petrol in a closed space near ${shortList(asked.map(({ id }) => id))}`;
      if (asked.length > 0) askOfSite(tally, asked, 'gasolineSpace', words);
    }
    return tally.outcome();
  },
};

/** By the part's own word; else by the box of the strings: where that is named, what does not name it stands outside. */
function isInSpace(part: Sparking, strings: readonly Gassing[]): boolean | undefined {
  if (part.inBatterySpace !== undefined) return part.inBatterySpace;
  const boxes = strings.map(({ string }) => string.enclosure);
  if (part.enclosure !== undefined && boxes.includes(part.enclosure)) return true;
  return boxes.includes(undefined) ? undefined : false;
}

/** One question: which box the strings stand in says of every part whether it shares it. */
function askPlace(tally: Tally, parts: readonly Sparking[], strings: readonly Gassing[]): void {
  if (parts.length === 0) return;
  const boxless = strings.flatMap(({ string }) => (string.enclosure === undefined ? [string] : []));
  const words = `${shortList(boxless.map((string) => field(string, 'enclosure')))} (the box that it stands in), or inBatterySpace of ${shortList(parts.map(({ id }) => id))}`;
  tally.judge(
    parts.map(({ id }) => id),
    [
      missing(
        words,
        ...boxless.map((string) => wanted(string, 'enclosure')),
        ...parts.map((part) => wanted(part, 'inBatterySpace')),
      ),
    ],
  );
}

function gasFailure(context: CheckContext, part: Sparking, strings: readonly Gassing[]): Verdict {
  const farthest = Math.max(
    ...strings.map(({ string, current }) =>
      sparkDistanceMm({ capacityAh: string.capacityAh, milliampPerAh: current.milliampPerAh }),
    ),
  );
  const distance = formatQuantity({ value: farthest / 1000, unit: 'm', digits: 2 });
  return fact(
    context,
    'fix',
    `${titleOf(part)} can spark and stands in the space of ${shortList(strings.map(({ string }) => string.id))}, where gas gathers; outside it, sparks are to stay ${distance} from the vents (from memory).`,
  );
}

function petrolFailure(context: CheckContext, part: Sparking): Verdict {
  return {
    ...fact(
      context,
      'stop',
      `${titleOf(part)} is not ignition-protected, and the site has petrol in a closed space: its spark can set off the vapour.`,
    ),
    basis: clauseOf('spark-near-petrol', context),
  };
}
