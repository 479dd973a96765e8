/** Figures that the tables cannot supply and without which a job has no solution: bad input, found before any solve. */
import { conductorResistance } from '../conductor/resistance.ts';
import type { Issue } from '../job/issue.ts';
import type { CheckedJob } from '../job/job.ts';
import type { CablePart, Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import type { Tables } from '../tables/tables.ts';

/**
 * One issue for each conductor whose resistance neither the job gives nor the tables of its practice know (an SAE gauge or
 * an outside diameter that no trade list has). Paths as in the job file. Empty for a job that can be solved.
 */
export function missingFigures({
  job,
  tables,
}: {
  readonly job: CheckedJob;
  readonly tables: Tables;
}): readonly Issue[] {
  const issues: Issue[] = [];
  const look = (part: Part, path: string): void => {
    for (const { cable, field } of conductorsOf(part)) {
      if (cable.resistanceOhm !== undefined) continue;
      const found = conductorResistance(cable, { practice: job.practice, tables: tables.conductors });
      if (!('missing' in found)) continue;
      issues.push({
        path: `${path}.${field}`,
        code: 'not-in-list',
        message: `The resistance of ${cable.id} cannot be found: ${found.missing}. Choose a listed size, or give resistanceOhm.`,
      });
      return;
    }
  };
  job.parts.forEach((part, k) => {
    look(part, `parts[${k}]`);
  });
  job.cases.forEach((operatingCase, k) => {
    for (const [id, part] of operatingCase.changed) look(part, `cases[${k}].set.${id}`);
  });
  return issues;
}

function conductorsOf(part: Part): { cable: CablePart; field: string }[] {
  if (part.kind === 'cable') return [{ cable: part, field: 'size' }];
  if (part.kind !== 'pair') return [];
  const [plus, minus] = cablesOfPair(part);
  const minusField = part.minusSize === undefined ? 'size' : 'minusSize';
  return [
    { cable: plus, field: 'size' },
    { cable: minus, field: minusField },
  ];
}
