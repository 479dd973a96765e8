/** Asks the engine about a small job: its answer, its findings, and all that was taken for granted. */
import {
  type CheckedJob,
  type CheckReport,
  type Draft,
  type Issue,
  type OperatingPoint,
  operatingPoint,
  originOf,
  type PartFigure,
  type PartId,
  partFigures,
  type Result,
  runChecks,
  type SmallJob,
  startSmall,
  type VoltWalk,
  voltWalk,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';

export interface SmallAnswer {
  readonly draft: Draft;
  readonly job: CheckedJob;
  readonly point: OperatingPoint;
  readonly walk: VoltWalk | null;
  readonly report: CheckReport;
  readonly taken: readonly { readonly part: PartId; readonly figure: PartFigure }[];
}

export function answerOf(small: SmallJob): Result<SmallAnswer, readonly Issue[]> {
  const started = startSmall(small, tables);
  if (!started.ok) return started;
  const { draft, job } = started.value;
  const operatingCase = job.cases[0];
  if (operatingCase === undefined) throw new Error('a small job has a case');
  const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
  const load = job.parts.find(({ kind }) => kind === 'load' || kind === 'inverter');
  const walk = load === undefined ? null : voltWalk({ job, operatingCase, point, load: load.id });
  const report = runChecks({ job, tables, cases: job.cases, points: [point] });
  return {
    ok: true,
    value: { draft, job, point, walk: walk?.ok === true ? walk : null, report, taken: takenForGranted(job, point) },
  };
}

/** Figures that nobody gave: guesses, defaults, and what the solve assumed. */
function takenForGranted(job: CheckedJob, point: OperatingPoint): SmallAnswer['taken'] {
  const operatingCase = job.cases[0];
  if (operatingCase === undefined) return [];
  return job.parts.flatMap((part) =>
    partFigures({ job, operatingCase, point, tables, part: part.id })
      .filter(({ value, from }) => value !== null && from !== 'standard')
      .filter(({ field, from }) => from === 'assumed' || ['guess', 'default'].includes(originOf(part, field)))
      .map((figure) => ({ part: part.id, figure })),
  );
}
