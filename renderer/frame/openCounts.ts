/** What is open in each stage, for the marks of the spine. */
import type { OperatingPoint, Severity } from '../../core/api.ts';
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
    findings: findingCount(answers),
    handover: null,
  };
}

type Answers = ReturnType<typeof useOpenJob.getState>['answers'];

function findingCount(answers: Answers): OpenCount | null {
  if (answers === null) return null;
  const { findings, notChecked } = answers.report;
  for (const severity of ['stop', 'fix', 'look', 'note'] as const) {
    const count = findings.filter((finding) => finding.severity === severity).length;
    if (count > 0) return { severity, count, words: `${String(count)} ${inWords[severity]}` };
  }
  return notChecked.length === 0
    ? null
    : { severity: 'note', count: notChecked.length, words: `${String(notChecked.length)} not done` };
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
