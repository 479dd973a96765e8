/** What the solve took for granted, each figure with its range, where it comes from and how far that may be trusted. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import { originOf } from '../job/part.ts';
import type { Assumption } from '../network/answer.ts';
import type { Citations } from './citations.ts';
import { caseTitle } from './cover.ts';
import type { Block, Cell, TableBlock } from './document.ts';
import { milliohms, NOT_GIVEN, plain, unitWord } from './figures.ts';
import type { ReportInput } from './input.ts';
import { count, fieldWords, ORIGIN_WORDS, plainFields, sentenceCase } from './wording.ts';

/** One line of the table: the same assumption made for several parts is told once, with all their names. */
interface AssumptionLine {
  readonly assumption: Assumption;
  readonly words: string;
  readonly parts: string[];
  readonly cases: string[];
}

export function assumptionSection(input: ReportInput, citations: Citations): readonly Block[] {
  const lines = gather(input);
  const blocks: Block[] = [{ kind: 'heading', level: 1, text: 'What was assumed' }];
  if (lines.length === 0) {
    blocks.push({
      kind: 'paragraph',
      tone: 'body',
      text: 'The solve reports no assumed figure: all that it needed was in the job.',
    });
  } else {
    const counted = count(lines.length, 'figure');
    blocks.push(
      {
        kind: 'paragraph',
        tone: 'body',
        text: `${counted} not in the job ${lines.length === 1 ? 'was' : 'were'} taken as below. A figure from a label or a meter in its place makes the answers better. Numbers in brackets point to the list of sources at the end.`,
      },
      assumptionTable(lines, input, citations),
    );
  }
  const marked = markedFigures(input.job);
  if (marked.rows.length > 0) blocks.push(marked);
  return blocks;
}

function gather({ job, points }: ReportInput): readonly AssumptionLine[] {
  const lines = new Map<string, AssumptionLine>();
  for (const point of points) {
    for (const assumption of point.assumptions) {
      const words = withoutPart(assumption);
      const key = JSON.stringify([
        assumption.field,
        typeof assumption.value === 'number' ? assumption.value : '',
        assumption.unit,
        assumption.range,
        assumption.origin,
        assumption.basis.text,
        words,
      ]);
      const line = lines.get(key) ?? { assumption, words, parts: [], cases: [] };
      const part = assumption.part ?? 'the whole system';
      if (!line.parts.includes(part)) line.parts.push(part);
      const title = caseTitle(job, point, points);
      if (!line.cases.includes(title)) line.cases.push(title);
      lines.set(key, line);
    }
  }
  // The same figure in several cases stands together, in the order in which the figures first came up.
  const found = [...lines.values()];
  const fields = [...new Set(found.map(({ assumption }) => assumption.field))];
  return fields.flatMap((field) => found.filter(({ assumption }) => assumption.field === field));
}

/**
 * The assumption's sentence without the name of its part, so that the same sentence about two parts is the same; field names
 * and units of the job file become words. Nothing is left where it only repeats the columns.
 */
function withoutPart({ text, part, field, value }: Assumption): string {
  const general = part === null ? text : withoutName(text, part);
  if (general.startsWith(`${field} taken as ${value}`)) return '';
  const plainly = plainFields(general);
  const name = `${fieldWords(field)} `;
  return plainly.startsWith(name) ? plainly.slice(name.length) : plainly;
}

function withoutName(text: string, part: string): string {
  // Only whole words: a string called C must not eat the C of a field's name.
  const name = part.replaceAll(/[.*+?^${}()|[\]\\]/g, '\\$&');
  const whole = new RegExp(`(?: of |(?<![\\w.+-]))"?${name}"?(?![\\w+-])`, 'g');
  return text.replaceAll(whole, (found) => (/^ of |^"/.test(found) ? '' : 'the part')).replaceAll('  ', ' ');
}

function assumptionTable(lines: readonly AssumptionLine[], { points }: ReportInput, citations: Citations): TableBlock {
  const rows = lines.map(({ assumption, words, parts, cases }): readonly Cell[] => [
    nameCell(assumption, words),
    valueText(assumption),
    rangeText(assumption),
    ORIGIN_WORDS[assumption.origin],
    citations.mark(assumption.basis),
    cases.length < points.length && cases.length > 0
      ? { text: parts.join(', '), under: `in ${cases.join('; ')}` }
      : parts.join(', '),
  ]);
  return {
    kind: 'table',
    caption: 'Figures taken by the program',
    columns: [
      { head: 'Figure', kind: 'text', align: 'left' },
      { head: 'Value', kind: 'id', align: 'left' },
      { head: 'Range', kind: 'id', align: 'left' },
      { head: 'Origin', kind: 'id', align: 'left' },
      { head: 'Basis', kind: 'text', align: 'left' },
      { head: 'Parts', kind: 'text', align: 'left' },
    ],
    rows,
    notes: rows.some((row) => row.includes(NOT_GIVEN)) ? [`${NOT_GIVEN} no number, or no range known.`] : [],
  };
}

/** Where the assumption is no number, its sentence is the figure. */
function nameCell({ field, value }: Assumption, words: string): Cell {
  const name = sentenceCase(fieldWords(field));
  if (typeof value === 'number') return { text: name, under: words };
  return words.includes(':') ? sentenceCase(words) : `${name}: ${words}`;
}

function valueText({ value, unit }: Assumption): string {
  return typeof value === 'number' ? quantity(value, unit) : NOT_GIVEN;
}
function rangeText({ range, unit }: Assumption): string {
  return range === null ? NOT_GIVEN : `${quantity(range[0], unit, true)} – ${quantity(range[1], unit)}`;
}

/** Assumed figures deserve three digits at most; ohms read better as milliohms. */
function quantity(value: number, unit: string, bare = false): string {
  const small = unit === 'ohm' && Math.abs(value) < 1;
  const number = plain(Number((small ? value * 1000 : value).toPrecision(unit === 'V' ? 4 : 3)));
  const word = small ? 'mΩ' : unitWord(unit);
  return bare || word === '' ? number : `${number}\u00a0${word}`;
}

/** The job's own figures that are not from a label: measured or guessed, with the range given for them. */
function markedFigures(job: CheckedJob): TableBlock {
  const rows = job.parts.flatMap((part) =>
    [...new Set([...part.origin.keys(), ...part.range.keys()])].map((field): readonly Cell[] => {
      const range = part.range.get(field);
      return [
        part.id,
        sentenceCase(fieldWords(field)),
        fieldValue(part, field),
        range === undefined ? NOT_GIVEN : `${fieldText(field, range[0])} – ${fieldText(field, range[1])}`,
        ORIGIN_WORDS[originOf(part, field)],
      ];
    }),
  );
  return {
    kind: 'table',
    caption: 'Figures of the job whose origin was stated',
    columns: [
      { head: 'Part', kind: 'id', align: 'left' },
      { head: 'Figure', kind: 'text', align: 'left' },
      { head: 'Value', kind: 'id', align: 'left' },
      { head: 'Range', kind: 'id', align: 'left' },
      { head: 'Origin', kind: 'id', align: 'left' },
    ],
    rows,
    notes: ['All other figures that the job gives count as read from a label or a drawing.'],
  };
}

const UNIT_OF_SUFFIX: readonly (readonly [RegExp, string])[] = [
  [/PerDegC$/, ' per °C'],
  [/DegC$/, ' °C'],
  [/Ohm$/, ' Ω'],
  [/Mv$/, ' mV'],
  [/Ah$/, ' Ah'],
  [/Years$/, ' years'],
  [/(?<=[a-z])A$/, ' A'],
  [/(?<=[a-z])V$/, ' V'],
  [/(?<=[a-z])W$/, ' W'],
  [/(?<=[a-z])M$/, ' m'],
  [/(?<=[a-z])S$/, ' s'],
];

function fieldValue(part: Part, field: string): string {
  const value: unknown = Reflect.get(part, field);
  if (typeof value === 'number') return fieldText(field, value);
  if (typeof value === 'string') return value;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return NOT_GIVEN;
}
function fieldText(field: string, value: number): string {
  const unit = UNIT_OF_SUFFIX.find(([suffix]) => suffix.test(field))?.[1] ?? '';
  if (unit === ' Ω' && Math.abs(value) < 1) return `${milliohms(value)}\u00a0mΩ`;
  if (unit === ' years' && value === 1) return '1\u00a0year';
  return `${plain(value)}${unit.replace(' ', '\u00a0')}`;
}

/** How many different figures were assumed: the lines of the table. */
export function countAssumptions(input: ReportInput): number {
  return gather(input).length;
}
