/** What `check` prints for a person: findings worst first, then what could not be checked, then what passed. */
import {
  type CheckedJob,
  type CheckReport,
  comparePractices,
  type Finding,
  formatQuantity,
  type Measure,
  numberText,
  type Practice,
  type Severity,
} from '../../core/api.ts';
import { statusWords } from './statusWords.ts';
import { textTable, wrapped } from './textTable.ts';

const severities: readonly Severity[] = ['stop', 'fix', 'look', 'note'];
const severityWords: Readonly<Record<Severity, string>> = {
  stop: 'STOP  do not energise until this is put right',
  fix: 'FIX   outside the chosen practice',
  look: 'LOOK  a person has to judge this',
  note: 'NOTE  for information',
};
export const caution =
  'This is arithmetic on the figures of the job. It does not replace the local code, the makers’ instructions, the inspector or a ' +
  'licensed electrician; where they differ, they prevail. Isolate every source and prove the circuit dead before working on it: a ' +
  'battery cannot be switched off, and a spanner across it burns.';

/** The same job judged by another practice. */
export interface Beside {
  readonly practice: Practice;
  readonly report: CheckReport;
}

export function checkText(job: CheckedJob, report: CheckReport, beside?: Beside): string {
  const { findings, notChecked, passed } = report;
  const assumed = job.practiceAssumed === true ? ', assumed; the job names none' : '';
  const counts = severities.map((severity) => `${String(countOf(findings, severity))} ${severity}`).join(', ');
  const passedCount = passed.reduce((sum, { count }) => sum + count, 0);
  return [
    `${job.title}\nPractice: ${job.practice}${job.practiceEdition === undefined ? '' : ` (${job.practiceEdition})`}${assumed}\n`,
    `${counts}; ${String(notChecked.length)} not checked; ${String(passedCount)} passed.\n`,
    ...severities.map((severity) => findingsText(severity, findings)),
    notChecked.length === 0
      ? ''
      : `Not checked, for want of a figure (this is not a pass):\n${textTable(
          ['rule', 'parts', 'missing'].map((head) => ({ head, align: 'left' })),
          notChecked.map(({ rule, parts, missing }) => [rule, parts.join(', '), missing]),
        )}`,
    passed.length === 0
      ? ''
      : `Passed:\n${textTable(
          [
            { head: 'rule', align: 'left' },
            { head: 'times', align: 'right' },
          ],
          passed.map(({ rule, count }) => [rule, String(count)]),
        )}`,
    beside === undefined ? '' : besideText(job.practice, report, beside),
    wrapped(caution),
  ]
    .filter((text) => text !== '')
    .join('\n');
}

/** What two books say of one job, where they differ. */
function besideText(practice: Practice, own: CheckReport, { practice: other, report }: Beside): string {
  const { apart, alike } = comparePractices(own, report);
  const alikeText = `${String(alike.length)} ${alike.length === 1 ? 'finding is' : 'findings are'} the same in both.\n`;
  if (apart.length === 0) return `Beside it by ${other}: no finding differs; ${alikeText}`;
  const cell = (finding: Finding | null) =>
    finding === null
      ? 'no finding'
      : `${finding.severity}: ${measureText(finding.measured)}, limit ${measureText(finding.limit)}`;
  const rows = apart.map(({ own: here, other: there }) => {
    const either = here ?? there;
    return [either?.rule ?? '', (either?.parts ?? []).join(', '), cell(here), cell(there)];
  });
  const heads = ['rule', 'parts', practice, other].map((head) => ({ head, align: 'left' as const }));
  return `Where ${practice} and ${other} differ:\n${textTable(heads, rows)}${alikeText}`;
}

function countOf(findings: readonly Finding[], severity: Severity): number {
  return findings.filter((finding) => finding.severity === severity).length;
}

function findingsText(severity: Severity, findings: readonly Finding[]): string {
  const texts = findings.filter((finding) => finding.severity === severity).map(findingText);
  return texts.length === 0 ? '' : `${severityWords[severity]}\n\n${texts.join('\n')}`;
}

function findingText(finding: Finding): string {
  const parts = finding.parts.length === 0 ? 'the job' : finding.parts.join(', ');
  const indent = { indent: '    ' };
  return [
    wrapped(`- ${finding.rule} at ${parts}, case ${finding.case}`),
    wrapped(finding.message, indent),
    wrapped(`Measured ${measureText(finding.measured)}, limit ${measureText(finding.limit)}.`, indent),
    wrapped(`Remedy: ${finding.remedy}`, indent),
    wrapped(`Basis: ${finding.basis} [${statusWords[finding.basisStatus]}]`, indent),
  ].join('');
}

/** A measure of unit `1` may be a fraction or a count, so it is written as the number that it is. */
function measureText({ value, unit }: Measure): string {
  return unit === '1' ? numberText({ value }) : formatQuantity({ value, unit });
}
