/** The table of rules for DEVELOPERS.md: what each is, how grave, what it rests on, and where it is tested. */
import type { Rule } from '../../core/checks/rule.ts';
import { rules } from '../../core/checks/rules.ts';
import type { Practice } from '../../core/job/job.ts';
import { tables } from '../../data/index.ts';
import { battery, jobOf } from '../core/checksJob.ts';
import { severitiesOf } from './ruleSeverities.ts';
import { isBoundaryTest, type RuleTest, testsOfRule } from './ruleTests.ts';

export const TABLE_START = '<!-- table of rules: made from the code, see test/architecture/rules.test.ts -->';
export const TABLE_END = '<!-- end of the table of rules -->';

const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];

export function ruleTable(tests: readonly RuleTest[]): string {
  const head = ['rule', 'severity', 'basis', 'status', 'practices', 'tests'];
  const rows = rules.map((rule) => rowOf(rule, tests));
  return [head, head.map(() => '---'), ...rows].map((cells) => `| ${cells.join(' | ')} |`).join('\n');
}

function rowOf(rule: Rule, tests: readonly RuleTest[]): readonly string[] {
  const bases = PRACTICES.map((practice) => {
    const judge = { job: jobOf({ practice, parts: [battery('B1')] }), tables, practice: tables.practices[practice] };
    return rule.basisFor(judge);
  });
  const sources = [...new Set(bases.map(({ source }) => source))];
  const statuses = [...new Set(bases.map(({ status }) => status))];
  const own = testsOfRule(rule.id, tests);
  const files = [...new Set(own.map(({ file }) => file))];
  const count = `${own.length} (${own.filter(isBoundaryTest).length} at the limit)`;
  return [
    `\`${rule.id}\``,
    severitiesOf(rule.id),
    sources.join(', '),
    statuses.join(', '),
    rule.byPractice ? 'by practice' : 'all alike',
    `${count}: ${files.join(', ')}`,
  ];
}
