/** Runs every rule over a job and gathers findings, what was not checked, and what passed. */
import type { CheckRequest } from './checkContext.ts';
import { CheckContext } from './checkContext.ts';
import type { CheckReport, Finding, NotChecked, Passed } from './finding.ts';
import type { RankedFinding, Rule, RuleOutcome } from './rule.ts';
import { rules } from './rules.ts';
import { SEVERITY_ORDER } from './tally.ts';

export type { CheckRequest } from './checkContext.ts';

/**
 * Judges a job by its practice. Each case is solved once (battery resistance over minutes; in the first second for a case with a
 * starting load; or answers handed in), then every rule runs. Of one rule and part the worst case is told. Findings stand worst
 * first: by severity, then by how far beyond the limit. What lacks a figure, a case without an operating point, and every rule
 * of a book when the job names no practice, stand among the not checked, never among the passed.
 * A job for which `missingFigures` has issues cannot be solved, so it must not come here.
 */
export function runChecks(request: CheckRequest): CheckReport {
  return runRules(new CheckContext(request), rules);
}

/** The same with some of the rules only. */
export function runRules(context: CheckContext, chosen: readonly Rule[]): CheckReport {
  const ranked: RankedFinding[] = [];
  const notChecked: NotChecked[] = [];
  const passed: Passed[] = [];
  for (const rule of chosen) {
    const outcome = outcomeOf(rule, context);
    ranked.push(...outcome.findings);
    for (const gap of outcome.notChecked) notChecked.push({ rule: rule.id, ...gap });
    if (outcome.passed > 0) passed.push({ rule: rule.id, count: outcome.passed });
  }
  return { findings: worstFirst(ranked), notChecked, passed };
}

const NOTHING: RuleOutcome = { findings: [], notChecked: [], passed: 0 };

function outcomeOf(rule: Rule, context: CheckContext): RuleOutcome {
  if (!context.drawn.some(({ kind }) => rule.kinds.includes(kind))) return NOTHING;
  if (rule.byPractice && context.job.practiceAssumed === true) {
    const missing = 'practice of the job: which rule book judges it';
    return { ...NOTHING, notChecked: [{ parts: [], missing, fields: [{ part: null, field: 'practice' }] }] };
  }
  const outcome = rule.run(context);
  const gaps = gapsOf(rule, context);
  return gaps.length === 0 ? outcome : { ...outcome, notChecked: [...outcome.notChecked, ...gaps] };
}

/** Cases that a rule should have read and that have no operating point to read. */
function gapsOf(rule: Rule, { cases, steady }: CheckContext): RuleOutcome['notChecked'] {
  if (rule.reads === 'drawing') return [];
  const wanted = rule.reads === 'every-case' ? cases : cases.filter((one) => !one.isStarting);
  const gaps = wanted
    .filter((one) => !one.isSolved)
    .map((one) => ({ parts: [], missing: `operating point of case ${one.id}: ${why(one.point.outcome)}` }));
  if (rule.reads === 'steady-cases' && steady.length === 0 && gaps.length === 0) {
    return [{ parts: [], missing: 'a case without a starting load' }];
  }
  return gaps;
}

function why(outcome: 'solved' | 'collapse' | 'unsupplied'): string {
  if (outcome === 'collapse') return 'a load asks for more than the network can deliver';
  return outcome === 'unsupplied' ? 'no source in it' : 'its proof of balance does not hold';
}

function worstFirst(ranked: readonly RankedFinding[]): readonly Finding[] {
  const order = (finding: Finding) => SEVERITY_ORDER.indexOf(finding.severity);
  const byExcess = (a: number, b: number) => (a === b ? 0 : b - a);
  const sorted = [...ranked];
  sorted.sort((a, b) => order(a.finding) - order(b.finding) || byExcess(a.excess, b.excess));
  return sorted.map(({ finding }) => finding);
}
