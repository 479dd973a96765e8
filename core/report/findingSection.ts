/** The verdicts worst first, then what could not be judged, then what was compared and held. */
import type { CheckReport, Finding } from '../checks/finding.ts';
import { rules } from '../checks/rules.ts';
import { partNames } from './caseWords.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import type { Block, EntryBlock, TableBlock } from './document.ts';
import { withUnit } from './figures.ts';
import type { ReportInput } from './input.ts';
import {
  count,
  plainFields,
  SEVERITIES,
  SEVERITY_WORDS,
  STATUS_WORDS,
  sentenceCase,
  withoutStatus,
} from './wording.ts';

/** Worst first; among equals in the order in which the checks gave them. */
export function worstFirst(findings: readonly Finding[]): readonly Finding[] {
  return SEVERITIES.flatMap((severity) => findings.filter((finding) => finding.severity === severity));
}

/** `2 STOP, 1 FIX`, or that there are none. */
export function findingCounts({ findings }: CheckReport): string {
  const told = SEVERITIES.flatMap((severity) => {
    const number = findings.filter((finding) => finding.severity === severity).length;
    return number === 0 ? [] : [`${number} ${SEVERITY_WORDS[severity].word}`];
  });
  return told.length === 0 ? 'none' : told.join(', ');
}

export function findingSection(input: ReportInput, citations: Citations): readonly Block[] {
  const { checkReport, job } = input;
  const findings = worstFirst(checkReport.findings);
  const intro: Block =
    findings.length === 0
      ? {
          kind: 'paragraph',
          tone: 'body',
          text: 'The checks that were made gave no finding. See below which were made and which were not.',
        }
      : {
          kind: 'facts',
          facts: SEVERITIES.filter((severity) => findings.some((finding) => finding.severity === severity)).map(
            (severity) => ({
              label: SEVERITY_WORDS[severity].word,
              value: SEVERITY_WORDS[severity].meaning,
            }),
          ),
        };
  return [
    { kind: 'heading', level: 1, text: 'Findings' },
    intro,
    ...cautionsAt('findings', job, citations),
    ...findings.map((finding, index) => entryOf(finding, index + 1, input, citations)),
    { kind: 'heading', level: 2, text: 'Checks not done' },
    ...notDone(input),
    { kind: 'heading', level: 2, text: 'Checks passed' },
    ...passed(checkReport),
  ];
}

function entryOf(finding: Finding, number: number, { job, points }: ReportInput, citations: Citations): EntryBlock {
  const where = partNames(job, finding.parts);
  const caseLabel = job.cases.find(({ id }) => id === finding.case)?.label ?? finding.case.replaceAll(/[-_]/g, ' ');
  const status = STATUS_WORDS[finding.basisStatus];
  const cited = citations.short({ text: finding.basis, status: finding.basisStatus });
  return {
    kind: 'entry',
    number: String(number),
    mark: finding.severity,
    word: SEVERITY_WORDS[finding.severity].word,
    title: plainFields(finding.message),
    facts: [
      { label: 'Where', value: where === '' ? 'the system as a whole' : where },
      ...(points.length > 1 && finding.case !== '' ? [{ label: 'Case', value: caseLabel }] : []),
      { label: 'Measured', value: `${withUnit(finding.measured)}, limit ${withUnit(finding.limit)}` },
      { label: 'Remedy', value: plainFields(finding.remedy) },
      {
        label: 'Basis',
        value:
          finding.basis === status
            ? `${status} ${cited}`
            : `${plainFields(withoutStatus(finding.basis))} (${status}) ${cited}`,
      },
    ],
  };
}

/** What a rule compares, in the rule's own words. */
function comparedBy(id: string): string {
  return sentenceCase(plainFields(rules.find((rule) => rule.id === id)?.compares ?? id));
}

function notDone({ checkReport, job }: ReportInput): readonly Block[] {
  if (checkReport.notChecked.length === 0) {
    return [{ kind: 'paragraph', tone: 'body', text: 'None: every check had the figures it needs.' }];
  }
  const table: TableBlock = {
    kind: 'table',
    caption: 'Checks not done, and the figure that each is waiting for',
    columns: [
      { head: 'What was to be compared', kind: 'text', align: 'left' },
      { head: 'Missing', kind: 'text', align: 'left' },
      { head: 'Part', kind: 'text', align: 'left' },
      { head: 'Found since', kind: 'blank', align: 'left' },
    ],
    rows: checkReport.notChecked.map(({ rule, missing, parts }) => [
      comparedBy(rule),
      plainFields(missing),
      partNames(job, parts),
      '',
    ]),
    notes: [],
  };
  return [
    {
      kind: 'paragraph',
      tone: 'body',
      text: `${count(checkReport.notChecked.length, 'check')} could not be made for want of a figure. They count neither as passed nor as failed. The last column is for the pen.`,
    },
    table,
  ];
}

function passed({ passed: held }: CheckReport): readonly Block[] {
  if (held.length === 0) return [{ kind: 'paragraph', tone: 'body', text: 'No comparison was made that held.' }];
  return [
    {
      kind: 'table',
      caption: 'Comparisons that held',
      columns: [
        { head: 'Times', kind: 'number', align: 'right' },
        { head: 'What was compared', kind: 'text', align: 'left' },
      ],
      rows: held.map(({ rule, count: times }) => [String(times), comparedBy(rule)]),
      notes: [],
    },
  ];
}
