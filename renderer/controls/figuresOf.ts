/** The figures of a part as the last answer used them, found once per answer. */
import { caseById, type OperatingPoint, type PartFigure, type PartId, partFigures } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { Answers } from '../state/answers.ts';

type ByField = ReadonlyMap<string, PartFigure>;
const found = new WeakMap<OperatingPoint, Map<PartId, ByField>>();
const none: ByField = new Map();

/** By field; empty while there are no answers, or for a part that they do not know. */
export function figuresOf(answers: Answers | null, caseId: string, part: PartId): ByField {
  const point = answers?.points.get(caseId);
  const operatingCase = answers === null ? undefined : caseById(answers.job, caseId);
  if (answers === null || point === undefined || operatingCase === undefined) return none;
  let byPart = found.get(point);
  if (byPart === undefined) {
    byPart = new Map();
    found.set(point, byPart);
  }
  let figures = byPart.get(part);
  if (figures === undefined) {
    const list = partFigures({ job: answers.job, part, operatingCase, point, tables });
    figures = new Map(list.map((figure) => [figure.field, figure]));
    byPart.set(part, figures);
  }
  return figures;
}
