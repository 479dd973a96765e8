/** The section on strings: whether the bank works as one, the answer first, then the tables that it was read from. */
import type { OneOutStudy, SharedString, SharingCase } from '../strings/answer.ts';
import type { StringsStudy } from '../strings/study.ts';
import { heaviest, type SentenceTopic, type StudySentence } from '../strings/words/sentence.ts';
import { studySentences } from '../strings/words/sentences.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import { caseTitle } from './cover.ts';
import type { Block, Cell, TableBlock } from './document.ts';
import { amps, fixed, NOT_GIVEN, percent, plain, volts, watts } from './figures.ts';
import type { ReportInput } from './input.ts';
import { id, number, schedule, text } from './schedule.ts';
import { type ShareBar, shareFigure } from './shareFigure.ts';
import { plainFields } from './wording.ts';

/** More cases than these are told in their own section alone. */
const MOST_CASES = 4;
/** Strings named in a row of losses, and bars in the figure. */
const MOST_OTHERS = 6;
const MOST_BARS = 16;
/** Rows of the table of layouts. */
const MOST_LAYOUTS = 7;
/** Sentences that lead; the rest follow as a list. */
const LEADING: readonly SentenceTopic[] = ['rest', 'sharing', 'one-out'];
/** Told by a table of their own. */
const IN_TABLES: readonly SentenceTopic[] = ['joining', 'leads'];

/** Nothing where no two strings lie side by side and no string was read block by block. */
export function stringsSection(input: ReportInput, citations: Citations): readonly Block[] {
  const { strings: study } = input;
  if (study === undefined) return [];
  const several = study.banks.some(({ branches }) => branches.length > 1);
  if (!several && !study.series.some(({ from }) => from === 'readings')) return [];
  const sentences = studySentences(study, (caseId) => caseName(input, caseId)).map((one) => ({
    ...one,
    text: plainFields(one.text),
  }));
  return [
    { kind: 'heading', level: 1, text: 'Strings' },
    ...leadOf(sentences),
    ...(several ? severalStrings(input, study, citations) : []),
    ...seriesTable(study),
  ];
}

function severalStrings(input: ReportInput, study: StringsStudy, citations: Citations): readonly Block[] {
  return [
    ...sharing(input, study),
    ...bandTable(study),
    ...lossTable(study),
    ...layoutTable(study),
    ...leadTable(study),
    ...joining(input, study, citations),
  ];
}

function leadOf(sentences: readonly StudySentence[]): readonly Block[] {
  const urgent = sentences.filter((one) => one.urgent).map((one) => one.text);
  const told = sentences.filter((one) => !one.urgent && !IN_TABLES.includes(one.about));
  const leads = LEADING.flatMap((about) => told.find((one) => one.about === about) ?? []);
  const first = leads.length > 0 ? leads : told.slice(0, 1);
  const rest = told.filter((one) => !first.includes(one)).map((one) => one.text);
  return [
    ...(urgent.length === 0 ? [] : [{ kind: 'caution', title: 'Stop', points: urgent } as const]),
    { kind: 'paragraph', tone: 'lead', text: first.map((one) => one.text).join(' ') },
    ...(rest.length === 0 ? [] : [{ kind: 'list', ordered: false, items: rest } as const]),
  ];
}

function sharing(input: ReportInput, study: StringsStudy): readonly Block[] {
  const slow = study.cases.filter(({ model, outcome }) => model === study.cases[0]?.model && outcome === 'solved');
  const byWeight = [...slow];
  byWeight.sort((a, b) => weightOf(b) - weightOf(a));
  const chosen = slow.filter((one) => byWeight.indexOf(one) < MOST_CASES);
  const rows = chosen.flatMap((one) => {
    const fast = study.cases.find((other) => other.case === one.case && other.model !== one.model);
    return one.strings.map((string, index) => sharingRow(caseName(input, one.case), string, fast, index === 0));
  });
  const left = slow.length - chosen.length;
  const notes = [
    'Amps out of a string are positive. A share is of the current of its bank; the fair share is by capacity. No share is told of a bank that carries less than a fiftieth of its capacity an hour.',
    ...(left > 0 ? [`${String(left)} more cases, in which the strings carry less, stand under Operating cases.`] : []),
  ];
  return [
    ...figureOf(input, study),
    ...dense(
      schedule(
        'How the strings share',
        [
          text('Case'),
          id('String'),
          number('Over minutes', 'A'),
          number('Share', '%'),
          number('Fair', '%'),
          number('Off', '%'),
          number('First second', 'A'),
          number('Share', '%'),
          number('Limit', 'A'),
        ],
        rows,
        notes,
      ),
    ),
  ];
}

function weightOf({ banksA }: SharingCase): number {
  return Math.max(0, ...banksA.map((bankA) => Math.abs(bankA ?? 0)));
}

function sharingRow(
  name: string,
  string: SharedString,
  fast: SharingCase | undefined,
  isFirst: boolean,
): readonly Cell[] {
  const first = fast?.strings.find((one) => one.id === string.id);
  return [
    isFirst ? name : '',
    string.id,
    orNone(string.currentA, amps),
    orNone(string.share, percent),
    percent(string.fairShare),
    orNone(string.deviation, percent),
    orNone(first?.currentA, amps),
    orNone(first?.share, percent),
    string.limit === null ? NOT_GIVEN : amps(string.limit.limitA),
  ];
}

function orNone(value: number | null | undefined, words: (value: number) => string): string {
  return value === null || value === undefined ? '' : words(value);
}

function caseName({ job, points }: ReportInput, caseId: string): string {
  const point = points.find((one) => one.case === caseId);
  return point === undefined ? caseId.replaceAll(/[-_]/g, ' ') : caseTitle(job, point, points);
}

/** The case that all else is about, as bars; whiskers from the draws. */
function figureOf(input: ReportInput, { cases, judgedCase, band }: StringsStudy): readonly Block[] {
  const judged = cases.find((one) => one.case === judgedCase && one.model === cases[0]?.model);
  const bars = (judged?.strings ?? []).flatMap(({ id: of, currentA, share, fairShare }): readonly ShareBar[] => {
    if (currentA === null || share === null) return [];
    const range = band?.strings.find((one) => one.id === of)?.deviation ?? null;
    const whisker = range === null ? null : ([fairShare * (1 + range.p05), fairShare * (1 + range.p95)] as const);
    return [{ id: of, currentA, share, fairShare, whisker }];
  });
  if (judged === undefined || bars.length < 2) return [];
  const told = heaviest(bars, MOST_BARS);
  const only =
    told.length === bars.length ? '' : `, the ${String(told.length)} of ${String(bars.length)} that carry most`;
  return [shareFigure(`Shares in ${caseName(input, judged.case)}${only}`, told)];
}

function bandTable({ band }: StringsStudy): readonly Block[] {
  if (band === null) return [];
  return schedule(
    'Over the ranges of the figures',
    [
      id('String'),
      number('As given', 'A'),
      number('5 in 100 below', 'A'),
      number('Middle', 'A'),
      number('5 in 100 above', 'A'),
    ],
    band.strings.map(({ id: of, nominalA, currentA }) => [
      of,
      amps(nominalA),
      amps(currentA.p05),
      amps(currentA.p50),
      amps(currentA.p95),
    ]),
    [
      `${String(band.draws)} seeded draws over the range of every figure of strings and wiring (seed ${String(band.seed)}).`,
    ],
  );
}

function lossTable({ oneOut }: StringsStudy): readonly Block[] {
  return oneOut.flatMap((one) =>
    dense(
      schedule(
        'One out: what the others then carry',
        [text('Gone'), text('The others'), number('Most the bank may give', 'A'), text('Cuts out next')],
        lossRows(one),
        [
          `Largest load with all in: ${one.largestA === null ? 'no limit known' : `${amps(one.largestA)} A`}. Largest that survives any one loss: ${one.survivesA === null ? 'not known' : `${amps(one.survivesA)} A`}.`,
        ],
      ),
    ),
  );
}

/** A string and the devices that take it out leave the same behind, and stand in one row. */
function lossRows({ losses }: OneOutStudy): readonly (readonly Cell[])[] {
  const rows = new Map<string, { readonly gone: string[]; readonly cells: readonly string[] }>();
  for (const { lost, strings, largestA, cascade, outcome } of losses) {
    const told = heaviest(strings, MOST_OTHERS);
    const more = strings.length - told.length;
    const others = told.map((one) => `${one.id} ${orNone(one.currentA, amps)} A${one.overLimit ? ' (over)' : ''}`);
    const cells = [
      outcome === 'solved' ? [...others, ...(more === 0 ? [] : [`${String(more)} more`])].join(', ') : outcome,
      orNone(largestA, amps),
      cascade.length === 0 ? 'all hold' : cascade.map((wave) => wave.join(', ')).join(', then '),
    ];
    const key = cells.join('\n');
    const row = rows.get(key);
    if (row === undefined) rows.set(key, { gone: [lost], cells });
    else row.gone.push(lost);
  }
  return [...rows.values()].map(({ gone, cells }) => [gone.join(', '), ...cells]);
}

function dense(tables: readonly TableBlock[]): readonly TableBlock[] {
  return tables.map((table) => ({ ...table, dense: true }));
}

function layoutTable({ layouts }: StringsStudy): readonly Block[] {
  if (layouts === null) return [];
  return schedule(
    'Other ways to tap the same bank',
    [
      text('Layout'),
      number('Worst off', '%'),
      id('Worst'),
      number('At the taps', 'V'),
      number('Lost', 'W'),
      number('Cable', 'm'),
    ],
    layouts.layouts
      .slice(0, MOST_LAYOUTS)
      .map((one) => [
        one.name,
        percent(one.spread),
        one.worst,
        volts(one.bankV),
        watts(one.lostW),
        one.cableM === null ? NOT_GIVEN : fixed(one.cableM, 2),
      ]),
    [
      `At ${amps(layouts.bankA)} A. Lost: in strings, links and leads. The best that leaves the blocks where they lie: ${layouts.best}.`,
      ...layouts.assumed.map(plainFields),
    ],
  );
}

function leadTable({ leads }: StringsStudy): readonly Block[] {
  if (leads === null || leads.leads.every(({ shortestM, longestM }) => shortestM === null && longestM === null))
    return [];
  return schedule(
    'How equal the leads have to be',
    [id('String'), number('Now', 'm'), number('Shortest', 'm'), number('Longest', 'm')],
    leads.leads.map((one) => [
      one.string,
      fixed(one.lengthM, 2),
      one.shortestM === null ? 'none' : fixed(one.shortestM, 2),
      one.longestM === null ? 'none' : fixed(one.longestM, 2),
    ]),
    [
      `Mean of the leads of one string; between these every string stays within ${percent(leads.limit)} % of its fair share, the others as drawn.`,
    ],
  );
}

function joining({ job }: ReportInput, { joining: all }: StringsStudy, citations: Citations): readonly Block[] {
  if (all.length === 0) return [];
  const flat = all.some((one) => one.flat);
  return [
    ...cautionsAt('joining', job, citations),
    ...schedule(
      'If strings that were apart are joined as they stand',
      [
        id('One'),
        id('Other'),
        number('Gap', 'V'),
        number('First moment', 'A'),
        number('Limit', 'A'),
        number('Gap for limit', 'V'),
        number('Moves', 'Ah'),
        text('Resistor'),
      ],
      all.map((one) => [
        one.a,
        one.b,
        volts(one.gapV),
        amps(one.inrushA),
        amps(one.limitA),
        volts(one.safeGapV),
        fixed(one.movedAh, 2),
        one.resistor === null
          ? 'none needed'
          : `${plain(Number(one.resistor.ohm.toPrecision(2)))} Ω, ${watts(one.resistor.w)} W`,
      ]),
      flat ? ['On a flat curve equal volts do not prove equal charge: charge both full before joining.'] : [],
    ),
  ];
}

function seriesTable({ series }: StringsStudy): readonly Block[] {
  const read = series.filter(({ from }) => from === 'readings');
  return schedule(
    'Along a string, as read',
    [
      text('Of'),
      text('Piece, from minus'),
      number('Volts', 'V'),
      number('From the mean', 'mV'),
      number('Of the mean', '%'),
    ],
    read.flatMap(({ strings, blocks }) =>
      blocks.map(({ name, voltageV, fromMeanV, fromMean }, index) => [
        index === 0 ? strings.join(', ') : '',
        name,
        volts(voltageV),
        fixed(fromMeanV * 1000, 0),
        percent(fromMean),
      ]),
    ),
    [
      'Percentages of a block are of the mean of the blocks; of halves both bases in use are told above, since one is twice the other.',
    ],
  );
}
