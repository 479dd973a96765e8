/** What `strings` prints for a person: the answer in sentences, then the tables that it was read from. */
import {
  type CheckedJob,
  fixedText,
  heaviest,
  type SharedString,
  type StringsStudy,
  studySentences,
} from '../../core/api.ts';
import { caution } from './checkText.ts';
import { listItem, type TextColumn, textTable, wrapped } from './textTable.ts';

const none = '—';
const mostTornadoRows = 5;
const mostOthersTold = 6;

export function stringsText(job: CheckedJob, study: StringsStudy): string {
  return [
    `${job.title}\n`,
    answerText(study),
    ...(study.resting.length === 0 ? [] : [sharingText(study), restText(study), lossText(study)]),
    joiningText(study),
    layoutText(study),
    leadText(study),
    bandText(study),
    seriesText(study),
    readingText(study),
    driftText(study),
    wrapped(caution),
  ]
    .filter((text) => text !== '')
    .join('\n');
}

function answerText(study: StringsStudy): string {
  if (study.resting.length === 0) return 'The job has no battery string.\n';
  const several = study.banks.some(({ branches }) => branches.length > 1);
  const sentences = studySentences(study);
  const urgent = sentences.filter((sentence) => sentence.urgent);
  const rest = sentences.filter((sentence) => !sentence.urgent);
  return [
    ...urgent.map(({ text }) => wrapped(text.toUpperCase().startsWith('STOP') ? text : `Stop: ${text}`)),
    several ? '' : 'No two strings of the job lie side by side, so none shares a load with another.\n',
    ...rest.map(({ text }) => listItem(text)),
  ].join('');
}

const left = (...heads: readonly string[]): TextColumn[] => heads.map((head) => ({ head, align: 'left' }));
const right = (...heads: readonly string[]): TextColumn[] => heads.map((head) => ({ head, align: 'right' }));

function figure(value: number | null | undefined, decimals: number): string {
  return value === null || value === undefined ? none : fixedText({ value, decimals, keepZeros: true });
}
const percent = (value: number | null | undefined): string => figure(value === null ? null : (value ?? 0) * 100, 1);

/** A section, or nothing where its table has no rows. */
function section(
  title: string,
  columns: readonly TextColumn[],
  rows: readonly (readonly string[])[],
  notes = '',
): string {
  return rows.length === 0 ? '' : `${title}\n${textTable(columns, rows)}${notes}`;
}

const modelWords = { slow: 'over minutes', fast: 'in the first second' } as const;

/** Both models of the battery side by side, where both were asked for. */
function sharingText({ cases, banks }: StringsStudy): string {
  const model = cases[0]?.model;
  if (model === undefined || banks.every(({ branches }) => branches.length < 2)) return '';
  const other = cases.find((one) => one.model !== model)?.model;
  const rows = cases
    .filter((one) => one.model === model)
    .flatMap((one) => {
      const beside = cases.find((found) => found.case === one.case && found.model === other);
      return one.strings.map((string) => [
        one.outcome === 'solved' ? one.case : `${one.case} (${one.outcome})`,
        ...sharingRow(string),
        ...(other === undefined ? [] : besideCells(beside?.strings.find(({ id }) => id === string.id))),
      ]);
    });
  const columns = [
    ...left('case', 'string'),
    ...right('A', 'share %', 'fair %', 'off %', 'A per Ah', 'limit A'),
    ...(other === undefined ? [] : right(`${other === 'fast' ? 'first second' : 'over minutes'} A`, 'share %')),
  ];
  return section(`Sharing, battery ${modelWords[model]} (amps out of a string are positive)`, columns, rows);
}

function sharingRow(string: SharedString): readonly string[] {
  return [
    string.id,
    figure(string.currentA, 2),
    percent(string.share),
    percent(string.fairShare),
    percent(string.deviation),
    figure(string.cRate, 3),
    string.limit === null ? none : figure(string.limit.limitA, 0),
  ];
}

function besideCells(string: SharedString | undefined): readonly string[] {
  return [figure(string?.currentA, 2), percent(string?.share ?? null)];
}

function restText({ atRest, atRestFirst, banks }: StringsStudy): string {
  if (atRest.outcome !== 'solved' || banks.every(({ branches }) => branches.length < 2)) return '';
  const rows = atRest.pairs.map(({ from, to, currentA }) => [from, to, figure(currentA, 2)]);
  const notes =
    `Given in all ${figure(atRest.givenA, 2)} A (first second: ${figure(atRestFirst.givenA, 2)} A), ` +
    `${figure(atRest.lostW, 1)} W turned to heat, ${figure(atRest.givenAhPerDay, 0)} Ah a day if it did not fade.\n`;
  return section(
    'With nothing switched on: what each difference of rest volts drives',
    [...left('gives', 'takes'), ...right('A')],
    rows,
    notes,
  );
}

type Others = StringsStudy['oneOut'][number]['losses'][number]['strings'];

/** Those that carry most; the rest are counted. */
function othersText(strings: Others): string {
  const told = heaviest(strings, mostOthersTold);
  const more = strings.length - told.length;
  const texts = told.map(({ id, currentA, overLimit }) => `${id} ${figure(currentA, 1)}${overLimit ? ' over' : ''}`);
  return [...texts, ...(more === 0 ? [] : [`${String(more)} more`])].join(', ');
}

function lossText({ oneOut }: StringsStudy): string {
  const rows = oneOut.flatMap(({ losses }) =>
    losses.map(({ lost, strings, largestA, cascade, outcome }) => [
      lost,
      outcome === 'solved' ? othersText(strings) : outcome,
      figure(largestA, 1),
      cascade.length === 0
        ? 'holds'
        : cascade
            .map((wave) => wave.slice(0, mostOthersTold).join(', ') + (wave.length > mostOthersTold ? ' …' : ''))
            .join(' then '),
    ]),
  );
  const title = oneOut.map((one) => `One out, case ${one.case}, ${figure(one.bankA, 1)} A`)[0] ?? '';
  return section(title, [...left('gone', 'the others, A'), ...right('most A'), ...left('cuts out next')], rows);
}

function joiningText({ joining, joiningMissing }: StringsStudy): string {
  const rows = joining.map((one) => [
    one.a,
    one.b,
    figure(one.gapV, 3),
    figure(one.inrushA, 1),
    figure(one.limitA, 1),
    figure(one.safeGapV, 3),
    figure(one.settleS / 60, 1),
    figure(one.movedAh, 2),
    figure(one.lostWh, 2),
    one.resistor === null ? 'none needed' : `${figure(one.resistor.ohm, 3)} ohm, ${figure(one.resistor.w, 0)} W`,
  ]);
  const columns = [
    ...left('a', 'b'),
    ...right('gap V', 'first A', 'limit A', 'gap for limit V', 'settles min', 'moves Ah', 'heat Wh'),
    ...left('resistor'),
  ];
  const missing = joiningMissing.map((text) => listItem(text)).join('');
  return section('Joining now', columns, rows) + (missing === '' ? '' : `Joints without an answer:\n${missing}`);
}

function layoutText({ layouts }: StringsStudy): string {
  if (layouts === null) return '';
  const rows = layouts.layouts.map((one) => [
    one.name,
    figure(one.spread * 100, 1),
    one.worst,
    figure(one.bankV, 3),
    figure(one.lostW, 1),
    figure(one.cableM, 2),
  ]);
  const columns = [
    ...left('layout'),
    ...right('worst off %'),
    ...left('worst'),
    ...right('at the taps V', 'lost W', 'cable m'),
  ];
  const notes = layouts.assumed.map((text) => listItem(text)).join('');
  return section(`Layouts, case ${layouts.case}, ${figure(layouts.bankA, 1)} A`, columns, rows, notes);
}

function leadText({ leads }: StringsStudy): string {
  if (leads === null) return '';
  const rows = leads.leads.map((one) => [
    one.string,
    figure(one.lengthM, 2),
    figure(one.shortestM, 2),
    figure(one.longestM, 2),
  ]);
  return section(
    `Leads: lengths that keep every string within ${percent(leads.limit)} % of its fair share, the others as drawn`,
    [...left('string'), ...right('now m', 'shortest m', 'longest m')],
    rows,
  );
}

function bandText({ band }: StringsStudy): string {
  if (band === null) return '';
  const rows = band.strings.map(({ id, nominalA, currentA, deviation }) => [
    id,
    figure(nominalA, 2),
    figure(currentA.p05, 2),
    figure(currentA.p50, 2),
    figure(currentA.p95, 2),
    deviation === null ? none : `${percent(deviation.p05)} to ${percent(deviation.p95)}`,
  ]);
  const columns = [...left('string'), ...right('A', '5 in 100 below', 'middle', '5 in 100 above', 'off %')];
  const title = `Over the ranges of the figures: ${String(band.draws)} draws, seed ${String(band.seed)}, case ${band.case}`;
  return section(title, columns, rows) + tornadoText(band);
}

function tornadoText({ tornado, judged }: NonNullable<StringsStudy['band']>): string {
  const rows = tornado
    .slice(0, mostTornadoRows)
    .map(({ label, origin, low, high, lowA, highA }) => [
      label,
      origin,
      `${figure(low, 4)} to ${figure(high, 4)}`,
      `${figure(lowA, 2)} to ${figure(highA, 2)}`,
    ]);
  return section(
    `\nWhat moves the current of ${judged} most`,
    left('figure', 'from', 'its range', `${judged}, A`),
    rows,
  );
}

function seriesText({ series }: StringsStudy): string {
  const rows = series.flatMap(({ strings, blocks, from, case: id }) =>
    blocks.map(({ name, voltageV, fromMeanV, fromMean }) => [
      strings.join(', '),
      from === 'readings' ? 'read' : (id ?? ''),
      name,
      figure(voltageV, 3),
      figure(fromMeanV * 1000, 0),
      percent(fromMean),
    ]),
  );
  return section(
    'Along a string, from minus to plus',
    [...left('string', 'from', 'block'), ...right('V', 'from the mean mV', '% of the mean')],
    rows,
  );
}

function readingText({ fromReadings }: StringsStudy): string {
  const rows = fromReadings.strings.map(({ string, cases, emfV, resistanceOhm, expectedOhm, significance }) => [
    string,
    cases.join(', '),
    `${figure(emfV.value, 3)} ± ${figure(emfV.standard, 3)}`,
    `${figure(resistanceOhm.value * 1000, 2)} ± ${figure(resistanceOhm.standard * 1000, 2)}`,
    figure(expectedOhm * 1000, 2),
    figure(significance, 1),
  ]);
  const columns = [...left('string', 'cases'), ...right('rest V', 'mΩ', 'expected mΩ', 'change / uncertainty')];
  const missing = fromReadings.missing.map((text) => listItem(text)).join('');
  return section('From the readings', columns, rows) + (rows.length === 0 ? '' : missing);
}

function driftText({ drift }: StringsStudy): string {
  if (drift === null) return '';
  const rows = drift.strings.map((one) => [
    one.half === null ? one.id : `${one.id}, ${one.half} half`,
    figure(one.givenAh, 1),
    figure(one.takenAh, 1),
    percent(one.share),
    percent(one.lowestCharge),
    percent(one.highestCharge),
    percent(one.endCharge),
    figure(one.largestA, 1),
  ]);
  const columns = [
    ...left('string'),
    ...right('gave Ah', 'took Ah', 'share %', 'lowest %', 'highest %', 'at the end %', 'most A'),
  ];
  const { throughputAh, mismatchAh } = drift.books;
  const books = `Books: ${figure(throughputAh, 1)} Ah went through, ${mismatchAh.toExponential(1)} Ah do not add up.\n`;
  const assumed = drift.assumed.map((text) => listItem(text)).join('');
  const cycle = drift.cycle.map((step) => `${step.case} ${figure(step.hours, 1)} h`).join(', ');
  return section(`Drift: ${String(drift.cycles)} cycles of ${cycle}`, columns, rows, books + assumed);
}
