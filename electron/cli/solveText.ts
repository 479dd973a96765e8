/** What `solve` prints for a person: volts, amps and watts of every case, and the sums that prove them. */
import {
  type Assumption,
  type CheckedJob,
  fixedText,
  formatQuantity,
  numberText,
  type OperatingPoint,
  type PartAnswer,
  type Proof,
} from '../../core/api.ts';
import { statusWords } from './statusWords.ts';
import { listItem, textTable, wrapped } from './textTable.ts';

const modelWords = {
  slow: 'battery resistance over minutes (slow)',
  fast: 'battery resistance in the first second (fast)',
} as const;

/** Stands where the network does not determine a figure; the reasons follow the table. */
const none = '—';

export function solveText(job: CheckedJob, points: readonly OperatingPoint[]): string {
  const kinds = new Map(job.parts.flatMap((part) => namesOf(part.id, part.kind)));
  const cases = points.map((point) => caseText(job, point, kinds));
  return [`${job.title}\n`, ...cases, assumedText(points)].filter((text) => text !== '').join('\n');
}

function namesOf(id: string, kind: string): [string, string][] {
  return kind === 'pair'
    ? [
        [`${id}.plus`, 'cable'],
        [`${id}.minus`, 'cable'],
      ]
    : [[id, kind]];
}

function caseText(job: CheckedJob, point: OperatingPoint, kinds: ReadonlyMap<string, string>): string {
  const label = job.cases.find((each) => each.id === point.case)?.label;
  const head = `Case ${point.case}${label === undefined ? '' : ` (${label})`}: ${point.outcome}, ${modelWords[point.model]}\n`;
  const remarks = point.remarks.map(({ message }) => wrapped(message)).join('');
  if (point.collapse !== undefined) return head + wrapped(point.collapse.message) + remarks;
  if (point.outcome !== 'solved') return `${head}No source supplies anything in this case.\n${remarks}`;
  return [
    head,
    remarks,
    '\n',
    junctionTable(point),
    '\n',
    partTable(point, kinds),
    reasonsText(point),
    '\n',
    proofText(point.proof),
  ].join('');
}

function junctionTable({ junctions }: OperatingPoint): string {
  const rows = [...junctions].map(([name, volts]) => [name, figure(volts, 3)]);
  return textTable(
    [
      { head: 'junction', align: 'left' },
      { head: 'V', align: 'right' },
    ],
    rows,
  );
}

function partTable({ parts }: OperatingPoint, kinds: ReadonlyMap<string, string>): string {
  const rows = [...parts.values()].map((answer) => [
    answer.id,
    kinds.get(answer.id) ?? '',
    figure(answer.currentA, 2),
    figure(answer.voltageV, 3),
    figure(answer.powerW, 1),
    answer.dropV === null ? '' : figure(answer.dropV * 1000, 1),
    answer.conductorDegC === undefined ? '' : figure(answer.conductorDegC, 1),
    stateText(answer),
  ]);
  return textTable(
    [
      { head: 'part', align: 'left' },
      { head: 'kind', align: 'left' },
      { head: 'A', align: 'right' },
      { head: 'V', align: 'right' },
      { head: 'W', align: 'right' },
      { head: 'drop mV', align: 'right' },
      { head: '°C', align: 'right' },
      { head: 'state', align: 'left' },
    ],
    rows,
  );
}

function figure(value: number | null, decimals: number): string {
  return value === null ? none : fixedText({ value, decimals, keepZeros: true });
}

function stateText({ state, inputA, inputV, segmentsA }: PartAnswer): string {
  const words = state === undefined ? [] : [state];
  if (typeof inputA === 'number' && typeof inputV === 'number') {
    words.push(`in ${figure(inputA, 2)} A at ${figure(inputV, 2)} V`);
  }
  if (segmentsA !== undefined && segmentsA.length > 1) {
    words.push(`segments ${segmentsA.map((each) => figure(each, 2)).join(', ')} A`);
  }
  return words.join('; ');
}

function reasonsText({ parts }: OperatingPoint): string {
  const reasons = [...parts.values()].flatMap(({ id, undetermined }) => {
    return undetermined === undefined ? [] : [wrapped(`${none} ${id}: ${undetermined}`)];
  });
  return reasons.length === 0 ? '' : `\nNot determined by the network (${none}):\n${reasons.join('')}`;
}

function proofText(proof: Proof): string {
  const watts = (value: number): string => formatQuantity({ value, unit: 'W', prefix: false, digits: 6 });
  const small = (value: number): string => numberText({ value, digits: 2 });
  return wrapped(
    `Balance: in ${watts(proof.powerInW)} = out ${watts(proof.powerOutW)} + heat ${watts(proof.heatW)}, ` +
      `remainder ${small(proof.mismatchW)} W; largest junction remainder ${small(proof.worstJunctionA)} A; ` +
      `largest voltage remainder ${small(proof.worstLoopV)} V; relative residual ${small(proof.relativeResidual)}; ` +
      `${String(proof.iterations)} iterations.`,
  );
}

/** What was assumed for want of a figure, each assumption once for all the cases and parts that share it. */
function assumedText(points: readonly OperatingPoint[]): string {
  const partsByWords = new Map<string, Set<string>>();
  for (const { assumptions } of points) {
    for (const assumption of assumptions) {
      const words = assumptionWords(assumption);
      const parts = partsByWords.get(words) ?? new Set();
      if (assumption.part !== null && !assumption.text.includes(assumption.part)) parts.add(assumption.part);
      partsByWords.set(words, parts);
    }
  }
  if (partsByWords.size === 0) return '';
  const lines = [...partsByWords].map(([words, parts]) => {
    const [told, more] = [[...parts].slice(0, mostPartsTold), parts.size - mostPartsTold];
    const where = told.length === 0 ? '' : ` At ${told.join(', ')}${more > 0 ? ` and ${String(more)} more` : ''}.`;
    return listItem(`${words}${where}`);
  });
  return `Assumed, since the job does not say:\n${lines.join('')}`;
}

const mostPartsTold = 8;

function assumptionWords({ text, value, unit, range, basis }: Assumption): string {
  const figures = typeof value === 'number' ? `: ${formatQuantity({ value, unit })}` : '';
  const between =
    range === null ? '' : `, between ${range.map((bound) => formatQuantity({ value: bound, unit })).join(' and ')}`;
  const status = basis.text.includes(statusWords[basis.status]) ? '' : `${statusWords[basis.status]}: `;
  return `${text}${figures}${between} [${status}${basis.text}].`;
}
