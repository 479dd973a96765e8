import { CHEMISTRY_WORDS } from '../diagram/kindWords.ts';
import type { CheckedJob } from '../job/job.ts';
import type { StringPart } from '../job/part.ts';
import type { CoverBlock, Fact } from './document.ts';
import { plain } from './figures.ts';
import type { ReportInput } from './input.ts';
import { count, join, MODEL_WORDS } from './wording.ts';

/** What the paper is and is not; repeated in one sentence at the foot of each page and at the end. */
export const LIMITS: readonly string[] = [
  "This is arithmetic on the figures that were entered. It replaces neither the local code nor the makers' instructions, neither the inspector nor the licensed electrician: where they differ from this paper, they prevail.",
  'A dash in the place of a figure means that it was not given; a check listed as not done was not made. Figures marked as assumed are assumed, and the verdicts that lean on them are no better.',
];

export const FOOTER =
  "Arithmetic on the figures entered; local code, makers' instructions, inspector and licensed electrician prevail.";

const BLANKS: readonly string[] = [
  'Signature of the person responsible',
  'Licence number',
  'Checked against (code, edition)',
  'Checked by',
  'Date',
];

export function coverOf(input: ReportInput): CoverBlock {
  return {
    kind: 'cover',
    title: input.job.title,
    subtitle: 'Wiring and operating report of an off-grid extra-low-voltage DC system',
    facts: coverFacts(input),
    statement: LIMITS,
    blanks: BLANKS,
  };
}

const PRACTICE_ASSUMED = 'not named in the job: nothing was judged by a rule book';

function coverFacts({ job, tables, points, options }: ReportInput): readonly Fact[] {
  const practice = tables.practices[job.practice];
  const facts: readonly (readonly [string, string | undefined])[] = [
    ['Prepared for', job.preparedFor],
    ['Prepared by', job.preparedBy],
    ['Date', options.preparedOn],
    ['Practice', job.practiceAssumed === true ? PRACTICE_ASSUMED : `${practice.name} (${practice.books})`],
    ['Edition', job.practiceEdition ?? 'not stated in the job'],
    ['System', systemText(job)],
    ['Bank', bankText(job)],
    ['Operating cases', casesText(job, points)],
    ['Drawn up with', `Ohmwright ${options.programVersion}`],
    ['Notes', job.notes],
  ];
  return facts.flatMap(([label, value]) => (value === undefined || value === '' ? [] : [{ label, value }]));
}

/** Nominal volts of the system: as set, else of the strings; `undefined` where nothing says. */
export function nominalVolts(job: CheckedJob): readonly number[] {
  const stated = job.settings.nominalV ?? job.targets.systemV;
  if (stated !== undefined) return [stated];
  const found = [...new Set(stringsOf(job).map((part) => part.blocksInSeries * part.blockNominalV))];
  found.sort((a, b) => a - b);
  return found;
}

function systemText(job: CheckedJob): string {
  const nominal = nominalVolts(job);
  const volts =
    nominal.length === 0 ? 'nominal volts not stated' : `${nominal.map(plain).join(' V and ')} V nominal, DC`;
  return `${volts}; ${count(job.parts.length, 'part')}`;
}

function stringsOf(job: CheckedJob): readonly StringPart[] {
  return job.parts.filter((part) => part.kind === 'string');
}

/** Strings of the same make-up are told once: `3 strings of 2 × 12 V, 100 Ah, lead-acid, AGM`. */
function bankText(job: CheckedJob): string {
  const strings = stringsOf(job);
  if (strings.length === 0) return 'no battery in the job';
  const groups = new Map<string, number>();
  for (const part of strings) {
    const build = `${part.blocksInSeries} × ${plain(part.blockNominalV)} V, ${plain(part.capacityAh)} Ah, ${CHEMISTRY_WORDS[part.chemistry]}`;
    groups.set(build, (groups.get(build) ?? 0) + 1);
  }
  const energyWh = strings.reduce((sum, part) => sum + part.capacityAh * part.blocksInSeries * part.blockNominalV, 0);
  const told = [...groups].map(([build, number]) => `${count(number, 'string')} of ${build}`);
  return `${join(told)}; ${plain(Number((energyWh / 1000).toPrecision(3)))} kWh by label`;
}

function casesText(job: CheckedJob, points: ReportInput['points']): string {
  if (points.length === 0) return 'none was solved';
  const names = points.map((point) => caseTitle(job, point, points));
  return names.join('; ');
}

/** A case as it is called on paper: its label, and the battery model where the same case was solved with both. */
export function caseTitle(
  job: CheckedJob,
  point: ReportInput['points'][number],
  points: ReportInput['points'],
): string {
  const label = job.cases.find((candidate) => candidate.id === point.case)?.label;
  const name = label === undefined ? point.case.replaceAll(/[-_]/g, ' ') : label;
  const bothModels = points.some((other) => other.case === point.case && other.model !== point.model);
  const title = name.charAt(0).toUpperCase() + name.slice(1);
  return bothModels ? `${title} — ${MODEL_WORDS[point.model]}` : title;
}
