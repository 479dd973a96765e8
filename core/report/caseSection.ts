/** The operating cases: volts at junctions, then part by part what each case makes of them. */

import { KIND_WORDS } from '../diagram/kindWords.ts';
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import { answerLine, conditionsLine, hasFigures, sentence, stateText } from './caseWords.ts';
import { caseTitle, nominalVolts } from './cover.ts';
import type { Block, Cell, Column, TableBlock } from './document.ts';
import { amps, degrees, millivolts, NOT_GIVEN, percent, volts, watts } from './figures.ts';
import type { ReportInput } from './input.ts';

/** Cases side by side in the table of junctions. */
const CASES_ABREAST = 5;

export function caseSection({ job, points }: ReportInput): readonly Block[] {
  const blocks: Block[] = [{ kind: 'heading', level: 1, text: 'Operating cases' }];
  if (points.length === 0) {
    return [...blocks, { kind: 'paragraph', tone: 'body', text: 'No case was solved for this report.' }];
  }
  const figured = points.filter(hasFigures);
  if (figured.length > 0) {
    blocks.push(
      { kind: 'heading', level: 2, text: 'Volts at the junctions' },
      {
        kind: 'paragraph',
        tone: 'body',
        text: 'Each against the reference junction of its island (0 V). A meter between two junctions shows the difference of their figures.',
      },
      ...junctionTables(job, figured, points),
    );
  }
  return [...blocks, ...points.flatMap((point) => oneCase(job, point, points))];
}

function junctionTables(
  job: CheckedJob,
  figured: readonly OperatingPoint[],
  points: readonly OperatingPoint[],
): readonly TableBlock[] {
  const tables: TableBlock[] = [];
  for (let start = 0; start < figured.length; start += CASES_ABREAST) {
    tables.push(junctionTable(job, figured.slice(start, start + CASES_ABREAST), points));
  }
  return tables;
}

/** One or two cases leave room for several junctions in a row. */
function junctionTable(
  job: CheckedJob,
  abreast: readonly OperatingPoint[],
  points: readonly OperatingPoint[],
): TableBlock {
  const perRow = abreast.length === 1 ? 3 : abreast.length === 2 ? 2 : 1;
  const group: readonly Column[] = [
    { head: 'Junction', kind: 'id', align: 'left' },
    ...abreast.map(
      (point): Column => ({
        head: abreast.length === 1 ? 'Volts' : caseTitle(job, point, points),
        unit: 'V',
        kind: 'number',
        align: 'decimal',
      }),
    ),
  ];
  const names = [...(abreast[0]?.junctions.keys() ?? [])];
  const cells = names.map((junction): readonly Cell[] => {
    const label = job.junctions.get(junction)?.label;
    const reference = job.junctions.get(junction)?.reference === true ? 'reference' : undefined;
    const under = [label, reference].filter((words) => words !== undefined && words !== '').join(' · ');
    return [{ text: junction, under }, ...abreast.map((point) => voltsCell(point.junctions.get(junction)))];
  });
  const rows: (readonly Cell[])[] = [];
  for (let start = 0; start < cells.length; start += perRow) {
    const filled = cells.slice(start, start + perRow).flat();
    rows.push([...filled, ...Array.from({ length: perRow * group.length - filled.length }, () => '')]);
  }
  const gaps = cells.some((row) => row.includes(NOT_GIVEN));
  return {
    kind: 'table',
    caption:
      abreast.length === 1 && abreast[0] !== undefined
        ? `Junctions — ${caseTitle(job, abreast[0], points)}`
        : 'Junctions, case by case',
    columns: Array.from({ length: perRow }, () => group).flat(),
    rows,
    notes: gaps ? [`${NOT_GIVEN} not determined: nothing ties the junction to a reference in that case.`] : [],
  };
}
function voltsCell(voltageV: number | null | undefined): string {
  return voltageV === null || voltageV === undefined ? NOT_GIVEN : volts(voltageV);
}

function oneCase(job: CheckedJob, point: OperatingPoint, points: readonly OperatingPoint[]): readonly Block[] {
  const title = caseTitle(job, point, points);
  const blocks: Block[] = [
    { kind: 'heading', level: 2, text: title },
    { kind: 'paragraph', tone: 'lead', text: answerLine(job, point) },
    { kind: 'paragraph', tone: 'small', text: `The case: ${conditionsLine(job, point.case)}` },
  ];
  if (point.outcome === 'solved' && point.remarks.length > 0) {
    blocks.push({ kind: 'list', ordered: false, items: point.remarks.map(({ message }) => sentence(message)) });
  }
  if (hasFigures(point)) blocks.push(...new CaseTables(job, point, title).all());
  return blocks;
}

type TwoEndedPart = Extract<Part, { from: JunctionId }>;
function isTwoEnded(part: Part): part is TwoEndedPart {
  return 'from' in part && typeof part.from === 'string';
}

/** The tables of one case; figures that the network leaves open get a letter and the reason below the table. */
class CaseTables {
  private readonly job: CheckedJob;
  private readonly point: OperatingPoint;
  private readonly title: string;
  private reasons: string[] = [];
  private idle: readonly string[] = [];

  constructor(job: CheckedJob, point: OperatingPoint, title: string) {
    this.job = job;
    this.point = point;
    this.title = title;
  }

  all(): readonly Block[] {
    return [this.ends(), this.converters(), this.between()].flatMap((table): readonly Block[] => {
      if (table.rows.length > 0) return [table];
      return table.notes.map((note) => ({ kind: 'paragraph', tone: 'small', text: note }));
    });
  }

  private answered<P extends Part>(parts: readonly P[]): readonly { readonly part: P; readonly answer: PartAnswer }[] {
    return parts.flatMap((part) => {
      const answer = this.point.parts.get(part.id);
      return answer === undefined ? [] : [{ part, answer }];
    });
  }

  /** Parts that carry current, or of which it is not known; the others are gathered in one line below the table. */
  private working<P extends Part>(parts: readonly P[]): readonly { readonly part: P; readonly answer: PartAnswer }[] {
    const answered = this.answered(parts);
    const isIdle = ({ answer }: { readonly answer: PartAnswer }): boolean =>
      answer.currentA !== null && Math.abs(answer.currentA) < NO_CURRENT_A;
    this.idle = answered.filter(isIdle).map(({ part, answer }) => {
      const state = stateText(answer);
      return state === '' ? part.id : `${part.id} (${state})`;
    });
    return answered.filter((one) => !isIdle(one));
  }

  /** Sources and loads: what hangs between the poles. */
  private ends(): TableBlock {
    this.reasons = [];
    const parts = this.job.parts.filter((part) =>
      ['string', 'array', 'charger', 'load', 'inverter'].includes(part.kind),
    );
    const rows = this.working(parts).map(({ part, answer }): readonly Cell[] => [
      part.id,
      part.label ?? KIND_WORDS[part.kind],
      this.figure(answer.currentA, amps, answer),
      this.figure(answer.voltageV, volts, answer),
      this.figure(answer.powerW, watts, answer),
      stateText(answer),
    ]);
    return this.table(
      'Sources and loads',
      [
        { head: 'Part', kind: 'id', align: 'left' },
        { head: 'What', kind: 'text', align: 'left' },
        { head: 'Current', unit: 'A', kind: 'number', align: 'decimal' },
        { head: 'Voltage', unit: 'V', kind: 'number', align: 'decimal' },
        { head: 'Power', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'State', kind: 'text', align: 'left' },
      ],
      rows,
      ['Sources: delivered, a minus sign where a battery is being charged. Loads: taken.'],
    );
  }

  private converters(): TableBlock {
    this.reasons = [];
    this.idle = [];
    const parts = this.job.parts.filter((part) => part.kind === 'controller' || part.kind === 'converter');
    const rows = this.answered(parts).map(({ part, answer }): readonly Cell[] => [
      part.id,
      part.label ?? KIND_WORDS[part.kind],
      this.figure(answer.inputV, volts, answer),
      this.figure(answer.inputA, amps, answer),
      this.figure(answer.outputV, volts, answer),
      this.figure(answer.outputA, amps, answer),
      this.figure(answer.powerW, watts, answer),
      stateText(answer),
    ]);
    return this.table(
      'Controllers and converters',
      [
        { head: 'Part', kind: 'id', align: 'left' },
        { head: 'What', kind: 'text', align: 'left' },
        { head: 'In', unit: 'V', kind: 'number', align: 'decimal' },
        { head: 'In', unit: 'A', kind: 'number', align: 'decimal' },
        { head: 'Out', unit: 'V', kind: 'number', align: 'decimal' },
        { head: 'Out', unit: 'A', kind: 'number', align: 'decimal' },
        { head: 'Lost', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'State', kind: 'text', align: 'left' },
      ],
      rows,
      [],
    );
  }

  /** Conductors and devices: what the current passes through. */
  private between(): TableBlock {
    this.reasons = [];
    const nominal = nominalVolts(this.job);
    const base = nominal.length === 1 ? nominal[0] : undefined;
    const parts = this.job.parts
      .flatMap((part): readonly Part[] => (part.kind === 'pair' ? cablesOfPair(part) : [part]))
      .filter((part) => part.kind === 'busbar' || isTwoEnded(part));
    const rows = this.working(parts).flatMap(({ part, answer }): readonly (readonly Cell[])[] => {
      if (part.kind === 'busbar') return [this.busbarRow(part, answer)];
      return isTwoEnded(part) ? [this.twoEndedRow(part, answer, base)] : [];
    });
    return this.table(
      'Conductors and devices',
      [
        { head: 'Part', kind: 'id', align: 'left' },
        { head: 'From → to', kind: 'text', align: 'left' },
        { head: 'Current', unit: 'A', kind: 'number', align: 'decimal' },
        { head: 'Drop', unit: 'mV', kind: 'number', align: 'decimal' },
        { head: 'Drop', unit: '% of nominal', kind: 'number', align: 'decimal' },
        { head: 'Heat', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'Conductor', unit: '°C', kind: 'number', align: 'decimal' },
        { head: 'State', kind: 'text', align: 'left' },
      ],
      rows,
      [
        'Current: a minus sign where it flows from the second point to the first.',
        ...(base === undefined ? [`${NOT_GIVEN} no single nominal voltage to refer to.`] : []),
      ],
    );
  }

  private twoEndedRow(part: TwoEndedPart, answer: PartAnswer, nominalV: number | undefined): readonly Cell[] {
    return [
      part.id,
      `${part.from} → ${part.to}`,
      this.figure(answer.currentA, amps, answer),
      this.figure(answer.dropV, millivolts, answer),
      nominalV === undefined ? NOT_GIVEN : this.figure(answer.dropV, (dropV) => percent(dropV / nominalV), answer),
      this.figure(answer.powerW, watts, answer),
      answer.conductorDegC === undefined ? '' : degrees(answer.conductorDegC),
      stateText(answer),
    ];
  }

  private busbarRow(part: Extract<Part, { kind: 'busbar' }>, answer: PartAnswer): readonly Cell[] {
    const segments = (answer.segmentsA ?? []).map((currentA) =>
      currentA === null ? this.letter(answer) : amps(currentA),
    );
    return [
      part.id,
      segments.length > 1
        ? { text: part.junctions.join(' → '), under: `A in each segment: ${segments.join(', ')}` }
        : part.junctions.join(' → '),
      this.figure(answer.currentA, amps, answer),
      '',
      '',
      answer.powerW === null ? '' : watts(answer.powerW),
      '',
      answer.currentA === null ? '' : 'largest segment',
    ];
  }

  private figure(value: number | null | undefined, text: (value: number) => string, answer: PartAnswer): string {
    if (value === undefined) return '';
    return value === null ? this.letter(answer) : text(value);
  }

  /** `[a]`, and the reason in the notes of the table. */
  private letter(answer: PartAnswer): string {
    const reason = answer.undetermined ?? 'the network does not determine this figure';
    const known = this.reasons.indexOf(reason);
    const index = known === -1 ? this.reasons.push(reason) - 1 : known;
    return `[${String.fromCharCode(FIRST_LETTER + (index % LETTERS))}]`;
  }

  private table(
    caption: string,
    columns: readonly Column[],
    rows: readonly (readonly Cell[])[],
    notes: readonly string[],
  ): TableBlock {
    const lettered = this.reasons.map(
      (reason, index) => `[${String.fromCharCode(FIRST_LETTER + (index % LETTERS))}] not determined: ${reason}.`,
    );
    const idle = this.idle.length === 0 ? [] : [`Without current: ${this.idle.join(', ')}.`];
    const unused = columns.map((_, column) => rows.every((row) => row[column] === ''));
    return {
      kind: 'table',
      caption: `${caption} — ${this.title}`,
      columns: columns.filter((_, column) => unused[column] !== true),
      rows: rows.map((row) => row.filter((_, column) => unused[column] !== true)),
      dense: true,
      notes: [...(rows.length === 0 ? [] : notes), ...idle, ...lettered],
    };
  }
}
/** Less than a meter of this trade shows; solved figures of dead branches end up somewhere below. */
const NO_CURRENT_A = 0.0005;
const FIRST_LETTER = 'a'.charCodeAt(0);
const LETTERS = 26;
