/** The last pages: the sums that prove the answers, readings and a sheet for the next ones, sources, the statement. */
import type { CheckedJob, Reading } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { hasFigures, partName } from './caseWords.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import { caseTitle, LIMITS } from './cover.ts';
import type { Block, Cell, TableBlock } from './document.ts';
import { amps, degrees, fixed, NOT_GIVEN, scientific, volts, watts } from './figures.ts';
import type { ReportInput } from './input.ts';

export function proofSection({ job, points }: ReportInput): readonly Block[] {
  if (points.length === 0) return [];
  const rows = points.map((point): readonly Cell[] => {
    const { proof } = point;
    const title = caseTitle(job, point, points);
    if (point.outcome !== 'solved') return [title, point.outcome, '', '', '', '', '', '', ''];
    return [
      title,
      { text: proof.holds ? 'holds' : 'does not hold', under: `${proof.iterations} steps` },
      { text: scientific(proof.worstJunctionA), under: proof.worstJunction ?? '' },
      scientific(proof.worstLoopV),
      scientific(proof.relativeResidual),
      watts(proof.powerInW),
      watts(proof.powerOutW),
      watts(proof.heatW),
      scientific(proof.mismatchW),
    ];
  });
  return [
    { kind: 'heading', level: 1, text: 'Proof of balance' },
    {
      kind: 'paragraph',
      tone: 'body',
      text: "At each junction the currents add up to nothing (Kirchhoff's current rule), round each loop the volts add up to nothing (his voltage rule), and the power that goes in comes out again as work or heat. What is left over in the solved figures is printed here; a case that fails its bounds prints no figures at all.",
    },
    {
      kind: 'table',
      caption: 'What remains when all is added up',
      columns: [
        { head: 'Case', kind: 'text', align: 'left' },
        { head: 'Proof', kind: 'id', align: 'left' },
        { head: 'At a junction', unit: 'A', kind: 'text', align: 'left' },
        { head: 'In a part', unit: 'V', kind: 'text', align: 'left' },
        { head: 'Residual', unit: 'scaled', kind: 'text', align: 'left' },
        { head: 'In', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'Out', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'Heat', unit: 'W', kind: 'number', align: 'decimal' },
        { head: 'Left over', unit: 'W', kind: 'text', align: 'left' },
      ],
      rows,
      notes: [
        'At a junction: the largest remainder of the currents, with the junction where it stands. In a part: the largest disagreement between the law of a part and the volts across it. Residual: of the equations, scaled. Out: taken by loads, batteries under charge included. Left over: in less out less heat.',
      ],
    },
  ];
}

export function testSection({ job, points }: ReportInput, citations: Citations): readonly Block[] {
  const tables = [...readingTable(job, points), ...blankSheet(job, points)];
  if (tables.length === 0) return [];
  return [
    { kind: 'heading', level: 1, text: 'Readings and test record' },
    ...cautionsAt('measuring', job, citations),
    ...tables,
    {
      kind: 'facts',
      facts: ['Meter and serial number', 'Calibrated on', 'Weather and battery temperature', 'Read by, date'].map(
        (label) => ({ label, value: '' }),
      ),
    },
  ];
}

const SET_WORDS: Readonly<Record<'as-found' | 'as-left', string>> = { 'as-found': 'as found', 'as-left': 'as left' };

function readingTable(job: CheckedJob, points: readonly OperatingPoint[]): readonly TableBlock[] {
  if (job.readings.length === 0) return [];
  const rows = job.readings.map((reading): readonly Cell[] => {
    const point = points.find(({ case: id }) => id === reading.case) ?? (points.length === 1 ? points[0] : undefined);
    const computed = point === undefined || !hasFigures(point) ? undefined : computedFor(reading, point);
    const value = readingValue(reading);
    const text = readingText(reading);
    return [
      { text: reading.id, under: [reading.takenBy, reading.takenAt].filter(Boolean).join(', ') },
      placeOf(reading, job),
      [
        reading.set === undefined ? '' : SET_WORDS[reading.set],
        point === undefined ? '' : caseTitle(job, point, points),
      ]
        .filter((words) => words !== '')
        .join(', '),
      `${text(value)} ${READING_UNITS[reading.quantity]}`,
      computed === undefined ? NOT_GIVEN : `${text(computed)} ${READING_UNITS[reading.quantity]}`,
      computed === undefined ? NOT_GIVEN : `${signed(text(value - computed))} ${READING_UNITS[reading.quantity]}`,
      reading.standardUncertainty === undefined
        ? (reading.meter ?? NOT_GIVEN)
        : `± ${text(reading.standardUncertainty)} ${READING_UNITS[reading.quantity]}`,
    ];
  });
  return [
    {
      kind: 'table',
      caption: 'Readings entered, against what the drawing gives',
      columns: [
        { head: 'Reading', kind: 'id', align: 'left' },
        { head: 'Where', kind: 'text', align: 'left' },
        { head: 'When', kind: 'text', align: 'left' },
        { head: 'Measured', kind: 'id', align: 'right' },
        { head: 'Computed', kind: 'id', align: 'right' },
        { head: 'Difference', kind: 'id', align: 'right' },
        { head: 'Meter', kind: 'text', align: 'left' },
      ],
      rows,
      notes: [
        'Difference: measured less computed. Meter: its standard uncertainty where entered, else its class.',
        ...(rows.some((row) => row.includes(NOT_GIVEN))
          ? [`${NOT_GIVEN} no solved figure to compare with, or not given.`]
          : []),
      ],
    },
  ];
}

/** A difference that rounds to nothing has no sign. */
function signed(text: string): string {
  return text.startsWith('−') || !/[1-9]/.test(text) ? text : `+${text}`;
}

const READING_UNITS: Readonly<Record<Reading['quantity'], string>> = { voltage: 'V', current: 'A', temperature: '°C' };

function readingValue(reading: Reading): number {
  if (reading.quantity === 'voltage') return reading.valueV;
  return reading.quantity === 'current' ? reading.valueA : reading.valueDegC;
}
function readingText(reading: Reading): (value: number) => string {
  if (reading.quantity === 'voltage') return (value) => fixed(value, 3);
  return reading.quantity === 'current' ? amps : degrees;
}
function placeOf(reading: Reading, job: CheckedJob): string {
  return reading.quantity === 'voltage' ? `${reading.plus} against ${reading.minus}` : partName(job, reading.part);
}

function computedFor(reading: Reading, point: OperatingPoint): number | undefined {
  if (reading.quantity === 'voltage') {
    const plusV = point.junctions.get(reading.plus);
    const minusV = point.junctions.get(reading.minus);
    return typeof plusV === 'number' && typeof minusV === 'number' ? plusV - minusV : undefined;
  }
  const answer = point.parts.get(reading.part);
  return (reading.quantity === 'current' ? answer?.currentA : answer?.conductorDegC) ?? undefined;
}

/** A sheet for the next round of readings: what to expect beside room for what is found. */
function blankSheet(job: CheckedJob, points: readonly OperatingPoint[]): readonly TableBlock[] {
  const point = points.find(hasFigures);
  const strings = job.parts.filter((part) => part.kind === 'string');
  if (strings.length === 0) return [];
  const rows = strings.map((part): readonly Cell[] => {
    const answer = point?.parts.get(part.id);
    return [
      { text: part.id, under: part.label ?? '' },
      '',
      answer?.voltageV === undefined || answer.voltageV === null ? NOT_GIVEN : volts(answer.voltageV),
      '',
      answer?.currentA === undefined || answer.currentA === null ? NOT_GIVEN : amps(answer.currentA),
      '',
      '',
    ];
  });
  return [
    {
      kind: 'table',
      caption: 'Sheet for the next readings of the bank',
      columns: [
        { head: 'String', kind: 'id', align: 'left' },
        { head: 'At rest', unit: 'V read', kind: 'blank', align: 'left' },
        { head: 'Working', unit: 'V expected', kind: 'number', align: 'decimal' },
        { head: 'Working', unit: 'V read', kind: 'blank', align: 'left' },
        { head: 'Working', unit: 'A expected', kind: 'number', align: 'decimal' },
        { head: 'Working', unit: 'A read', kind: 'blank', align: 'left' },
        { head: 'Torque checked', kind: 'blank', align: 'left' },
      ],
      rows,
      notes:
        point === undefined
          ? [`${NOT_GIVEN} no solved case to expect from.`]
          : [`Expected figures: case ${caseTitle(job, point, points)}.`],
    },
  ];
}

export function sourceSection(citations: Citations): readonly Block[] {
  const items = citations.items();
  if (items.length === 0) return [];
  return [
    { kind: 'heading', level: 1, text: 'Sources' },
    {
      kind: 'paragraph',
      tone: 'body',
      text: 'Published: the text or table was seen. From memory: known to the trade and not seen again for this work; confirm it against the text before leaning on it. Common practice: a habit of the trade without a published source.',
    },
    { kind: 'sources', items },
  ];
}

export function statementSection(): readonly Block[] {
  return [
    { kind: 'heading', level: 1, text: 'Statement' },
    ...LIMITS.map((text): Block => ({ kind: 'paragraph', tone: 'body', text })),
    {
      kind: 'paragraph',
      tone: 'body',
      text: 'Nothing in this paper is a permit, a certificate or a licence to energise. The one who signs answers for the work, on the ground of what was seen, tested and measured there.',
    },
  ];
}
