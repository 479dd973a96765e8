import type { CheckedJob } from '../job/job.ts';
import type { CablePart, PairPart } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import type { Cell, TableBlock } from './document.ts';
import { feet, metres, milliohms, NOT_GIVEN, plain } from './figures.ts';
import { given, id, named, number, partsOf, schedule, text } from './schedule.ts';
import { sizeAsGiven, sizeOtherwise } from './sizes.ts';
import { METAL_WORDS, RUN_WORDS, STRANDING_WORDS } from './wording.ts';

export function conductorSchedule(job: CheckedJob, tables: ConductorTables): readonly TableBlock[] {
  const conductors = partsOf(job, 'cable', 'pair');
  return schedule(
    'Conductor schedule',
    [
      id('Conductor'),
      id('From'),
      id('To'),
      { ...number('Length', 'm'), align: 'right' },
      id('Size'),
      text('Metal, make'),
      text('Insulation, run'),
      number('Air', '°C'),
      number('Ends', 'mΩ'),
    ],
    conductors.flatMap((part) => conductorRows(part, tables)),
    [
      ...(conductors.some((part) => part.kind === 'pair')
        ? ['An out-and-back run is two conductors, each of the length shown: “.plus” goes out, “.minus” comes back.']
        : []),
      'Length: of each conductor, one way. The size in the second line is the nearest in the other notation, for orientation. Ends: both terminations together.',
    ],
  );
}

function conductorRows(part: CablePart | PairPart, tables: ConductorTables): readonly (readonly Cell[])[] {
  if (part.kind === 'cable') return [conductorRow(part, { name: named(part), from: part.from, to: part.to, tables })];
  const out = conductorRow(part, {
    name: { text: `${part.id}.plus`, under: part.label ?? '' },
    from: part.from.plus,
    to: part.to.plus,
    tables,
  });
  const back = { ...part, size: part.minusSize ?? part.size, lengthM: part.minusLengthM ?? part.lengthM };
  return [out, conductorRow(back, { name: `${part.id}.minus`, from: part.to.minus, to: part.from.minus, tables })];
}

interface ConductorEnds {
  readonly name: Cell;
  readonly from: string;
  readonly to: string;
  readonly tables: ConductorTables;
}

function conductorRow(part: CablePart | PairPart, { name, from, to, tables }: ConductorEnds): readonly Cell[] {
  const make = [part.metal && METAL_WORDS[part.metal], part.stranding && STRANDING_WORDS[part.stranding]]
    .filter(Boolean)
    .join(', ');
  const lay = [
    part.insulationDegC === undefined ? undefined : `${plain(part.insulationDegC)}\u00a0°C`,
    part.run && RUN_WORDS[part.run],
    part.loadedConductors === undefined ? undefined : `${part.loadedConductors} loaded`,
    part.sheathed === undefined ? undefined : part.sheathed ? 'sheathed' : 'not sheathed',
  ].filter(Boolean);
  return [
    name,
    from,
    to,
    { text: metres(part.lengthM), under: feet(part.lengthM) },
    sizeCell(part, tables),
    make === '' ? NOT_GIVEN : make,
    lay.length === 0 ? NOT_GIVEN : lay.join(', '),
    given(part.ambientDegC),
    part.given.has('endOhm') ? milliohms(part.endOhm) : NOT_GIVEN,
  ];
}

function sizeCell(part: CablePart | PairPart, tables: ConductorTables): Cell {
  if (part.size === undefined) {
    const measured = part.resistanceOhm === undefined ? '' : `${milliohms(part.resistanceOhm)} mΩ as given`;
    return { text: NOT_GIVEN, under: measured };
  }
  const several = part.inParallel === 1 ? '' : `${part.inParallel} × `;
  const under = sizeOtherwise(part.size, tables);
  return under === undefined
    ? `${several}${sizeAsGiven(part.size)}`
    : { text: `${several}${sizeAsGiven(part.size)}`, under };
}

export function jointSchedule(job: CheckedJob): readonly TableBlock[] {
  const joints = partsOf(job, 'joint').map((part): readonly Cell[] => [
    named(part),
    'joint',
    part.from,
    part.to,
    milliohms(part.resistanceOhm),
    NOT_GIVEN,
  ]);
  const bars = partsOf(job, 'busbar').map((part): readonly Cell[] => [
    named(part),
    'busbar',
    part.junctions[0] ?? '',
    part.junctions.slice(1).join(', '),
    part.given.has('segmentOhm') ? milliohms(part.segmentOhm) : NOT_GIVEN,
    ratings(part.ratingA, part.ratingV),
  ]);
  const bonds = partsOf(job, 'bond').map((part): readonly Cell[] => [
    named(part),
    'bond',
    part.from,
    part.to,
    NOT_GIVEN,
    part.size === undefined
      ? NOT_GIVEN
      : {
          text: sizeAsGiven(part.size),
          under: part.lengthM === undefined ? '' : `${metres(part.lengthM)} m (${feet(part.lengthM)})`,
        },
  ]);
  return schedule(
    'Busbars, joints and bonds',
    [id('Part'), id('Kind'), id('From'), text('To'), number('Resistance', 'mΩ'), text('Rating or size')],
    [...bars, ...joints, ...bonds],
    bars.length > 0 ? ['Resistance of a busbar: between neighbouring points.'] : [],
  );
}

function ratings(ratingA: number | undefined, ratingV: number | undefined): string {
  const parts = [
    ratingA === undefined ? '' : `${plain(ratingA)} A`,
    ratingV === undefined ? '' : `${plain(ratingV)} V`,
  ].filter((words) => words !== '');
  return parts.length === 0 ? NOT_GIVEN : parts.join(', ');
}
