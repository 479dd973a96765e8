/** What is open in each stage, for the marks of the spine. */
import type { Finding, OperatingPoint, RuleFamily, Severity } from '../../core/api.ts';
import { checkRules, SEVERITIES } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import type { Stage } from '../state/session.ts';
import type { OpenCount } from './Spine.tsx';

const inWords: Readonly<Record<Severity, string>> = { stop: 'stop', fix: 'fix', look: 'look', note: 'note' };

export function useOpenCounts(): Readonly<Record<Stage, OpenCount | null>> {
  const job = useOpenJob((open) => open.job);
  const answers = useOpenJob((open) => open.answers);
  return {
    site: job.practiceAssumed === true ? { severity: 'look', count: 1, words: 'no rule book' } : null,
    wiring: wiringCount(answers),
    strings: stringsCount(answers),
    findings: findingCount(answers),
    handover: null,
  };
}

type Answers = ReturnType<typeof useOpenJob.getState>['answers'];

function findingCount(answers: Answers): OpenCount | null {
  if (answers === null) return null;
  const { findings, notChecked } = answers.report;
  const worst = worstCount(findings);
  if (worst !== null) return worst;
  return notChecked.length === 0
    ? null
    : { severity: 'note', count: notChecked.length, words: `${String(notChecked.length)} not done` };
}

/** How many there are of the gravest kind. */
function worstCount(findings: readonly Finding[]): OpenCount | null {
  for (const severity of SEVERITIES) {
    const count = findings.filter((finding) => finding.severity === severity).length;
    if (count > 0) return { severity, count, words: `${String(count)} ${inWords[severity]}` };
  }
  return null;
}

const OF_STRINGS: ReadonlySet<RuleFamily> = new Set(['strings', 'battery']);
const stringRules: ReadonlySet<string> = new Set(
  checkRules.filter(({ family }) => OF_STRINGS.has(family)).map(({ id }) => id),
);

function stringsCount(answers: Answers): OpenCount | null {
  return answers === null ? null : worstCount(answers.report.findings.filter(({ rule }) => stringRules.has(rule)));
}

/** Cases without a balance, and parts that nothing feeds. */
function wiringCount(answers: Answers): OpenCount | null {
  if (answers === null) return null;
  const points = [...answers.points.values()];
  const collapsed = points.filter(({ outcome }) => outcome === 'collapse').length;
  if (collapsed > 0) return { severity: 'stop', count: collapsed, words: `${String(collapsed)} unsolved` };
  const loose = looseParts(points.filter((point) => point.case !== 'at-rest'));
  return loose === 0 ? null : { severity: 'look', count: loose, words: `${String(loose)} unfed` };
}

/** Parts that nothing feeds in any case: what one case switches off is meant to be off. */
function looseParts(points: readonly OperatingPoint[]): number {
  const unfedIn = points.map(
    ({ remarks }) =>
      new Set(
        remarks.filter(({ kind }) => kind === 'unfed' || kind === 'island-unsupplied').flatMap(({ parts }) => parts),
      ),
  );
  const [first, ...others] = unfedIn;
  return [...(first ?? [])].filter((part) => others.every((unfed) => unfed.has(part))).length;
}
