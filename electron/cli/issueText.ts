/** The issues of a job, for a person. */
import type { Issue } from '../../core/api.ts';

export function issueText(file: string, issues: readonly Issue[]): string {
  const count = issues.length === 1 ? 'an issue' : `${String(issues.length)} issues`;
  const lines = issues.map(({ path, message }) => `  ${path === '' ? '' : `${path}: `}${message}\n`);
  return `${file} has ${count}:\n${lines.join('')}`;
}
