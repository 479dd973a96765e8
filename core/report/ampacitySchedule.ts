/** What each conductor may carry by the practice in force, beside the most that any solved case puts through it. */

import type { Ampacity } from '../conductor/ampacity.ts';
import { ampacity } from '../conductor/ampacity.ts';
import { caseById } from '../job/job.ts';
import type { CablePart } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { hasFigures } from './caseWords.ts';
import type { Citations } from './citations.ts';
import { caseTitle, nominalVolts } from './cover.ts';
import type { Cell, TableBlock } from './document.ts';
import { cellText } from './document.ts';
import { amps, fixed, NOT_GIVEN, percent } from './figures.ts';
import type { ReportInput } from './input.ts';
import { id, number, text } from './schedule.ts';
import { STATUS_WORDS, sentenceCase } from './wording.ts';

/** Short in the rows, in full below the table. */
const FROM_MEMORY = 'from memory';

/** A conductor in the case that uses most of what it may carry there. */
interface HeaviestCase {
  readonly rated: Ampacity;
  readonly currentA: number;
  readonly title: string;
}

/** Nothing where the job names no practice, for then no book says what a conductor may carry. */
export function ampacitySchedule(input: ReportInput, citations: Citations): readonly TableBlock[] {
  const cables = input.job.parts.flatMap((part): readonly CablePart[] =>
    part.kind === 'pair' ? cablesOfPair(part) : part.kind === 'cable' ? [part] : [],
  );
  if (cables.length === 0 || input.job.practiceAssumed === true || !input.points.some(hasFigures)) return [];
  const reasons: string[] = [];
  const rows = cables.map((cable): readonly Cell[] => {
    const heaviest = heaviestCase(cable, input);
    if (!('missing' in heaviest)) return ratedRow(cable, heaviest, citations);
    const reason = sentenceCase(heaviest.missing);
    if (!reasons.includes(reason)) reasons.push(reason);
    return [cable.id, NOT_GIVEN, `[${letter(reasons.indexOf(reason))}]`, NOT_GIVEN, NOT_GIVEN, NOT_GIVEN, '', ''];
  });
  return [
    {
      kind: 'table',
      caption: 'What the conductors may carry, and the most they carry',
      columns: [
        id('Conductor'),
        number('Table', 'A'),
        text('Factors'),
        number('May carry', 'A'),
        number('Carries', 'A'),
        number('Used', '%'),
        text('Heaviest case'),
        text('Basis'),
      ],
      rows,
      dense: true,
      notes: [
        'May carry: figure of the table times the factors (those that are not 1), all conductors in parallel together. Heaviest case: the solved case that uses most of it, cases in which something starts left out.',
        ...(rows.some((row) => cellText(row.at(-1) ?? '').endsWith(FROM_MEMORY))
          ? [`“${FROM_MEMORY}”: ${STATUS_WORDS['from-memory']}.`]
          : []),
        ...reasons.map((reason, index) => `[${letter(index)}] ${reason}.`),
      ],
    },
  ];
}

function ratedRow(cable: CablePart, { rated, currentA, title }: HeaviestCase, citations: Citations): readonly Cell[] {
  const factors = rated.factors
    .filter(({ factor }) => factor !== 1)
    .map(({ name, factor }) => `${name} × ${fixed(factor, 2)}`);
  const said = [...rated.assumed.map((words) => `assumed: ${words}`), ...rated.remarks].join('; ');
  return [
    cable.id,
    amps(rated.baseA),
    { text: factors.length === 0 ? 'none' : factors.join(', '), under: said },
    amps(rated.finalA),
    amps(currentA),
    rated.finalA === 0 ? NOT_GIVEN : percent(currentA / rated.finalA),
    title,
    `${citations.short({ text: rated.basis.text, status: rated.status })} ${rated.status === 'from-memory' ? FROM_MEMORY : STATUS_WORDS[rated.status]}`,
  ];
}

function heaviestCase(
  cable: CablePart,
  { job, tables, points }: ReportInput,
): HeaviestCase | { readonly missing: string } {
  let heaviest: HeaviestCase | { readonly missing: string } = {
    missing: `current in ${cable.id}: no solved case without a start determines it`,
  };
  const nominal = nominalVolts(job);
  for (const point of points.filter(hasFigures)) {
    const operatingCase = caseById(job, point.case);
    // What lasts a second does not warm a cable.
    if (operatingCase?.surge !== undefined) continue;
    const current = point.parts.get(cable.id)?.currentA;
    if (operatingCase === undefined || current === undefined || current === null) continue;
    const rated = ampacity(cable, {
      practice: job.practice,
      ambientDegC: ambientOf(job, operatingCase),
      tables: tables.conductors,
      systemV: nominal.length === 1 ? nominal[0] : undefined,
    });
    if ('missing' in rated) return rated;
    const currentA = Math.abs(current);
    const isHeavier = 'missing' in heaviest || currentA * heaviest.rated.finalA > heaviest.currentA * rated.finalA;
    if (isHeavier) heaviest = { rated, currentA, title: caseTitle(job, point, points) };
  }
  return heaviest;
}

function letter(index: number): string {
  return String.fromCharCode('a'.charCodeAt(0) + (index % 26));
}
