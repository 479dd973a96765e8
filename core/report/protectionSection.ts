/** The section on short circuits: the answer first, then what flows where, and which device opens before which. */
import type { DeviceFigures, PairFigures, ProtectionFigures } from '../checks/protectionFigures.ts';
import type { JunctionId } from '../job/part.ts';
import type { JunctionFaultRow } from '../protection/faultSummary.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import type { Block, Cell, Column } from './document.ts';
import { faultAmps, filled } from './faultSchedules.ts';
import { fixed, milliohms, plain } from './figures.ts';
import type { ReportInput } from './input.ts';
import { id, number, schedule, text } from './schedule.ts';
import { count, join, plainFields } from './wording.ts';

/** More rows or pairs than these, and the least telling ones are counted only. */
const MOST_ROWS = 60;
const MOST_PAIRS = 40;
/** Assumptions in the note, and names in a sentence. */
const MOST_ASSUMED = 4;
const MOST_NAMES = 8;
/** From here on a second method says something else. */
const ANOTHER = 0.01;

/** Nothing without a study, or where no source reaches two poles. */
export function protectionSection(input: ReportInput, citations: Citations): readonly Block[] {
  const { job, protection } = input;
  if (protection === undefined) return [];
  const rows = [...across(protection.poles), ...across(protection.earth)];
  if (rows.length === 0) return [];
  const lead = [worst(rows), ...interrupting(protection.devices), ...opening(input, protection.devices)];
  return [
    { kind: 'heading', level: 1, text: 'Short circuits and protection' },
    { kind: 'paragraph', tone: 'lead', text: lead.join(' ') },
    ...cautionsAt('faults', job, citations),
    ...junctionTable(protection),
    ...selectivityTable(protection.pairs, citations),
  ];
}

/** What flows within one pole is no fault. */
function across(rows: readonly JunctionFaultRow[]): readonly JunctionFaultRow[] {
  return rows.filter(({ samePole, highest }) => !samePole && highest !== null);
}

const highestOf = (row: JunctionFaultRow | undefined): number => row?.highest?.current.firstA ?? 0;

function worst(rows: readonly JunctionFaultRow[]): string {
  const most = rows.reduce((known, row) => (highestOf(row) > highestOf(known) ? row : known));
  return `A short circuit sends at most ${faultAmps(highestOf(most))} A, at ${most.junction} to ${most.to}.`;
}

function names(devices: readonly DeviceFigures[]): string {
  const all = devices.map(({ device }) => device.id);
  const more = all.length - MOST_NAMES;
  return join(more > 0 ? [...all.slice(0, MOST_NAMES), `${String(more)} more`] : all);
}

function interrupting(devices: readonly DeviceFigures[]): readonly string[] {
  const reached = devices.filter(({ fault }) => fault !== null);
  if (reached.length === 0) return [];
  const rated = reached.filter(({ device }) => device.interruptA !== undefined);
  const short = rated.filter(({ device, fault }) => device.interruptA! < fault!.highestA);
  const atFirst = rated.filter(
    ({ device, fault, iecHighestA }) =>
      device.interruptA! >= fault!.highestA && device.interruptA! < (iecHighestA ?? 0),
  );
  const unrated = reached.filter(({ device }) => device.interruptA === undefined);
  return [
    ...(short.length === 0 ? [] : [`Rated to interrupt less than may flow through them: ${names(short)}.`]),
    ...(unrated.length === 0 ? [] : [`No interrupt rating given: ${names(unrated)}.`]),
    ...(atFirst.length === 0
      ? []
      : [`At the first instant by IEC 61660-1 more may flow than these are rated to interrupt: ${names(atFirst)}.`]),
    ...(short.length + atFirst.length + unrated.length > 0
      ? []
      : [`Every one of the ${count(rated.length, 'device')} is rated to interrupt what may flow through it.`]),
  ];
}

function opening({ job }: ReportInput, devices: readonly DeviceFigures[]): readonly string[] {
  const { faultClearS } = job.settings;
  const asked = devices.filter(({ fault }) => fault !== null && fault.lowestA !== null);
  const slow = asked.filter(({ atLowest }) => atLowest?.clears === false || (atLowest?.clearS ?? 0) > faultClearS);
  const unknown = asked.filter(({ atLowest }) => atLowest === null || atLowest.clears === null);
  const within = `${plain(faultClearS)} s`;
  if (asked.length > 0 && slow.length + unknown.length === 0)
    return [`At the lowest fault each of them has opened within ${within}, by the times that are known.`];
  return [
    ...(slow.length === 0 ? [] : [`Slower than ${within} at the lowest fault, or not sure to open: ${names(slow)}.`]),
    ...(unknown.length === 0 ? [] : [`Times not given: ${names(unknown)}.`]),
  ];
}

/** What one junction's row is made of. */
interface Place {
  readonly pole: JunctionFaultRow | undefined;
  readonly earth: JunctionFaultRow | undefined;
  readonly iec: JunctionFaultRow | undefined;
}

function placesOf({ poles, earth, iec }: ProtectionFigures): ReadonlyMap<JunctionId, Place> {
  const byJunction = (rows: readonly JunctionFaultRow[]) => new Map(across(rows).map((row) => [row.junction, row]));
  const [toPoles, toEarth, byIec] = [byJunction(poles), byJunction(earth), byJunction(iec.poles)];
  return new Map(
    [...new Set([...toPoles.keys(), ...toEarth.keys()])].map((junction) => [
      junction,
      { pole: toPoles.get(junction), earth: toEarth.get(junction), iec: byIec.get(junction) },
    ]),
  );
}

function junctionTable(protection: ProtectionFigures): readonly Block[] {
  const places = placesOf(protection);
  const targets = [...new Set([...places.values()].flatMap(({ pole }) => pole?.to ?? []))];
  const isIec = [...places.values()].some(({ pole, iec }) => pole !== undefined && isOther(pole, iec));
  const all = [...groupsOf(places, { isIec, isTold: targets.length > 1 })];
  const left = all.length - MOST_ROWS;
  if (left > 0) all.sort((a, b) => b.mostA - a.mostA);
  return schedule(
    targets.length === 1 ? `Short-circuit currents, each to ${targets[0]!}` : 'Short-circuit currents',
    junctionColumns,
    all.slice(0, MOST_ROWS).map(({ junctions, cells }): readonly Cell[] => [junctions.join(', '), ...cells]),
    [
      `Highest, lowest and source: plain Thévenin, volts over resistance. ${SIDES}`,
      ...(isIec ? [IEC] : []),
      ...taken(protection.assumed),
      ...(left > 0 ? [`${String(left)} more rows, of junctions at which less flows.`] : []),
    ],
  ).map((table) => ({ ...filled(table), dense: true }));
}

interface Group {
  readonly junctions: JunctionId[];
  readonly mostA: number;
  readonly cells: readonly string[];
}

/** Junctions with the same figures, joined by what has no resistance to speak of, stand in one row. */
function groupsOf(
  places: ReadonlyMap<JunctionId, Place>,
  { isIec, isTold }: { readonly isIec: boolean; readonly isTold: boolean },
): Iterable<Group> {
  const groups = new Map<string, Group>();
  for (const [junction, place] of places) {
    const cells = [isTold ? (place.pole?.to ?? '') : '', ...placeCells(place, isIec)];
    const key = JSON.stringify([place.pole?.to, cells]);
    const known = groups.get(key);
    if (known === undefined) groups.set(key, { junctions: [junction], mostA: highestOf(place.pole), cells });
    else known.junctions.push(junction);
  }
  return groups.values();
}

const junctionColumns: readonly Column[] = [
  text('Junction'),
  text('Shorted to'),
  number('Highest', 'A'),
  number('Lowest', 'A'),
  number('Source', 'mΩ'),
  number('IEC first', 'A'),
  number('IEC settled', 'A'),
  number('Earth, highest', 'A'),
  number('Earth, lowest', 'A'),
];
const SIDES =
  'Highest: everything closed and on, strings full, assumed resistances at the low end of their range, conductors at 20 °C. Lowest: the bank that sends least alone, low volts, high resistance, conductors hot, chargers nothing. A bolted fault: an arc lets less flow. Junctions of the pole that they are shorted to are left out.';
const IEC =
  'IEC: the highest by the battery branch of IEC 61660-1, 0.9 of the battery’s resistance at the first instant, 0.95 of its volts once settled.';

function placeCells({ pole, earth, iec }: Place, isIec: boolean): readonly string[] {
  const first = (row: JunctionFaultRow | undefined) => (row === undefined ? '' : faultAmps(highestOf(row)));
  const lowest = (row: JunctionFaultRow | undefined) => (row?.lowest ? faultAmps(row.lowest.current.settledA) : '');
  return [
    first(pole),
    lowest(pole),
    // A source that only limits its current has no resistance to speak of.
    pole?.highest && pole.lowest ? milliohms(pole.highest.current.sourceOhm) : '',
    ...(isIec ? [first(iec), iec?.highest ? faultAmps(iec.highest.current.settledA) : ''] : ['', '']),
    first(earth),
    lowest(earth),
  ];
}

function isOther(row: JunctionFaultRow, iec: JunctionFaultRow | undefined): boolean {
  const { firstA = 0, settledA = 0 } = iec?.highest?.current ?? {};
  return [firstA, settledA].some((currentA) => Math.abs(currentA - highestOf(row)) > ANOTHER * highestOf(row));
}

/** Without the field that each begins with, which is for those who fill in the job; what every solve assumes too is told elsewhere. */
function taken(all: readonly string[]): readonly string[] {
  const assumed = all.filter((line) => !/^(?:temperatureDegC|stateOfCharge):/.test(line));
  if (assumed.length === 0) return [];
  const lines = assumed.slice(0, MOST_ASSUMED).map((line) => plainFields(line.replace(/^\w+: /, '')));
  const more = assumed.length - lines.length;
  return [`Assumed: ${lines.join('; ')}${more > 0 ? `; ${String(more)} more` : ''}.`];
}

const ANSWERS = { yes: 'opens alone', no: 'both may open', open: 'not settled' } as const;

function selectivityTable(all: readonly PairFigures[], citations: Citations): readonly Block[] {
  const pairs = [...all];
  pairs.sort((a, b) => orderOf(a) - orderOf(b));
  const left = pairs.length - MOST_PAIRS;
  const told = pairs.slice(0, MOST_PAIRS);
  const bases = [...new Set(told.map(({ selectivity }) => citations.mark(selectivity.basis)))];
  return schedule(
    'Selectivity of devices in series',
    [
      id('Nearer the fault'),
      id('Farther'),
      text('Ratings'),
      number('Ratio', 'to 1'),
      number('Asked', 'to 1'),
      text('The nearer'),
      text('Judged by'),
    ],
    told.map((pair) => pairRow(pair)),
    [
      `Opens alone: the nearer opens and the farther holds, by what it was judged by. Ratio asked: ${bases.join('; ')}.`,
      ...(left > 0 ? [`${String(left)} more pairs, none of them worse.`] : []),
    ],
  );
}

function orderOf({ selectivity: { selective } }: PairFigures): number {
  return selective === false ? 0 : selective === null ? 1 : 2;
}

function pairRow({ upstream, downstream, selectivity }: PairFigures): readonly Cell[] {
  const { selective, ratio, needed, by } = selectivity;
  return [
    downstream.id,
    upstream.id,
    `${plain(downstream.ratingA)} A behind ${plain(upstream.ratingA)} A`,
    fixed(ratio, 2),
    fixed(needed, 1),
    ANSWERS[selective === null ? 'open' : selective ? 'yes' : 'no'],
    by === 'ratio' ? 'ratings' : selectivity.text,
  ];
}
