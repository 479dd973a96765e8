/** The first pages, for the owner and for the one who signs: what matters most, each case in a line, the proof, how to switch off. */
import type { CheckedJob } from '../job/job.ts';
import { countAssumptions } from './assumptionSection.ts';
import { answerLine, balanceLine, hasFigures, partName, partNames } from './caseWords.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import { caseTitle } from './cover.ts';
import type { Block, Fact } from './document.ts';
import { findingCounts, worstFirst } from './findingSection.ts';
import type { ReportInput } from './input.ts';
import { count, join, plainFields, SEVERITY_WORDS } from './wording.ts';

/** Findings told in front; all of them stand in their own section. */
const FINDINGS_IN_FRONT = 8;
/** Parts of a kind named one by one in the order for switching off. */
const PARTS_NAMED = 8;

export function summarySection(input: ReportInput, citations: Citations): readonly Block[] {
  const { job } = input;
  return [
    { kind: 'heading', level: 1, text: 'Summary' },
    { kind: 'facts', facts: standing(input) },
    ...topFindings(input),
    { kind: 'heading', level: 2, text: 'Each case in a line' },
    ...caseLines(input),
    { kind: 'heading', level: 2, text: 'Taking the system out of service' },
    ...cautionsAt('isolating', job, citations),
    { kind: 'list', ordered: true, items: switchingOff(job) },
  ];
}

function standing(input: ReportInput): readonly Fact[] {
  const { checkReport, job } = input;
  const assumed = countAssumptions(input);
  return [
    { label: 'Findings', value: findingCounts(checkReport) },
    {
      label: 'Checks not done',
      value:
        checkReport.notChecked.length === 0
          ? 'none'
          : `${checkReport.notChecked.length}, for want of a figure: listed after the findings`,
    },
    { label: 'Assumed figures', value: assumed === 0 ? 'none' : `${assumed}: listed under What was assumed` },
    ...(job.readings.length === 0
      ? []
      : [
          {
            label: 'Readings',
            value: `${count(job.readings.length, 'reading')} entered: listed under Readings and test record`,
          },
        ]),
  ];
}

function topFindings({ checkReport, job, points }: ReportInput): readonly Block[] {
  const worst = worstFirst(checkReport.findings).slice(0, FINDINGS_IN_FRONT);
  if (worst.length === 0) return [];
  const rest = checkReport.findings.length - worst.length;
  const severalCases = points.length > 1;
  return [
    { kind: 'heading', level: 2, text: 'Findings, worst first' },
    {
      kind: 'table',
      caption: 'Findings, worst first',
      columns: [
        { head: 'No.', kind: 'id', align: 'right' },
        { head: 'Severity', kind: 'id', align: 'left' },
        { head: 'What', kind: 'text', align: 'left' },
        { head: 'Where', kind: 'text', align: 'left' },
        ...(severalCases ? [{ head: 'Case', kind: 'text', align: 'left' } as const] : []),
      ],
      rows: worst.map((finding, index) => [
        String(index + 1),
        { text: SEVERITY_WORDS[finding.severity].word, mark: finding.severity },
        plainFields(finding.message),
        partNames(job, finding.parts),
        ...(severalCases
          ? [job.cases.find(({ id }) => id === finding.case)?.label ?? finding.case.replaceAll(/[-_]/g, ' ')]
          : []),
      ]),
      notes: rest === 0 ? [] : [`${count(rest, 'more finding')} in the section Findings.`],
    },
  ];
}

function caseLines({ job, points }: ReportInput): readonly Block[] {
  if (points.length === 0) return [{ kind: 'paragraph', tone: 'body', text: 'No case was solved for this report.' }];
  return [
    {
      kind: 'facts',
      facts: points.map((point) => ({ label: caseTitle(job, point, points), value: answerLine(job, point) })),
    },
    { kind: 'heading', level: 2, text: 'Proof of balance' },
    {
      kind: 'facts',
      facts: points.map((point) => ({
        label: caseTitle(job, point, points),
        value: hasFigures(point) ? balanceLine(point) : 'no figures, so no balance to show',
      })),
    },
  ];
}

function switchingOff(job: CheckedJob): readonly string[] {
  const named = (...kinds: readonly string[]): string => {
    const ids = job.parts.filter(({ kind }) => kinds.includes(kind)).map(({ id }) => partName(job, id));
    return ids.length === 0 ? '' : ids.length > PARTS_NAMED ? `all ${ids.length}, see the schedules` : join(ids);
  };
  const loads = named('load', 'converter');
  const inverters = named('inverter');
  const chargers = named('charger');
  const solar = named('array');
  const switches = named('switch');
  const devices = named('breaker', 'fuse');
  return [
    loads === '' ? '' : `Loads off: ${loads}.`,
    inverters === ''
      ? ''
      : `Inverters off at their own switch: ${inverters}. Wait until their capacitors have run down, as the maker says.`,
    chargers === '' ? '' : `Chargers off and unplugged, engine-driven ones stopped: ${chargers}.`,
    solar === '' ? '' : `Solar isolated or covered: ${solar}. It stays live on its own side.`,
    switches === '' ? '' : `Battery and circuit switches open: ${switches}. Lock or tag them.`,
    devices === '' ? '' : `With no current flowing, breakers open and fuses out where work is to be done: ${devices}.`,
    'Prove dead at the place of work, between the poles and from each pole to earth or frame, with a meter just proved on a known source.',
    'The batteries themselves, and all that is joined to them ahead of the first open device, stay live.',
  ].filter((step) => step !== '');
}
