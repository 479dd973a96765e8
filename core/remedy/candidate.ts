/** Changes worth trying for a finding, before any of them has been tried. */
import type { CheckReport, Finding } from '../checks/finding.ts';
import { setInCase } from '../draft/cases.ts';
import type { Draft } from '../draft/draft.ts';
import type { Edit } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import { Defect } from '../job/issue.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById } from '../job/job.ts';
import type { Part, PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { operatingPoint } from '../network/operatingPoint.ts';
import type { Tables } from '../tables/tables.ts';

/** What has to be done, from least to most; within a rank the smaller `amount` goes first. */
export type Effort = 'setting' | 'joint' | 'device' | 'cable' | 'part-away' | 'part-in' | 'string';
export const EFFORTS: readonly Effort[] = ['setting', 'joint', 'device', 'cable', 'part-away', 'part-in', 'string'];

export interface Candidate {
  readonly edit: Edit;
  /** In words: `3.2 m of 1/0 AWG`. */
  readonly cost: string;
  readonly effort: Effort;
  /** Compares candidates of one effort: metres times square millimetres, amperes of change. */
  readonly amount: number;
  /** The change leaves every volt and ampere as it is (another fuse rating): the answers at hand then still hold. */
  readonly sameAnswers?: true;
}

/** Candidates of one kind from the smallest change to the largest: the first that makes the finding go is the remedy. */
export interface Ladder {
  readonly rungs: readonly Candidate[];
  /** True where a rung that helps means that every higher one does: it may then be sought by halving. */
  readonly rising: boolean;
}

/** What ladders are made from. */
export class Bench {
  readonly draft: Draft;
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly finding: Finding;
  readonly report: CheckReport;
  private readonly points: readonly OperatingPoint[];

  constructor(request: {
    readonly draft: Draft;
    readonly job: CheckedJob;
    readonly tables: Tables;
    readonly finding: Finding;
    readonly report: CheckReport;
    readonly points?: readonly OperatingPoint[] | undefined;
  }) {
    this.draft = request.draft;
    this.job = request.job;
    this.tables = request.tables;
    this.finding = request.finding;
    this.report = request.report;
    this.points = request.points ?? [];
  }

  /** The case that the finding is told for. */
  get operatingCase(): OperatingCase {
    const found = caseById(this.job, this.finding.case) ?? this.job.cases[0];
    if (found === undefined) throw new Defect('every job has a case');
    return found;
  }

  /** The answer of the finding's case. */
  get point(): OperatingPoint {
    const { operatingCase } = this;
    return this.points.find((point) => point.case === operatingCase.id) ?? this.solve(operatingCase);
  }

  solve(operatingCase: OperatingCase): OperatingPoint {
    const { job, tables } = this;
    return operatingPoint({ job, operatingCase, tables, model: operatingCase.surge === undefined ? 'slow' : 'fast' });
  }

  /** A part as drawn. */
  drawn(id: PartId): Part | undefined {
    return this.job.parts.find((part) => part.id === id);
  }

  /** A part as it stands in the finding's case. */
  inCase(id: PartId): Part | undefined {
    return this.operatingCase.changed.get(id) ?? this.drawn(id);
  }

  /** Sets a field where the finding's figure comes from: in the case if the case changes it, else in the drawing. */
  set(part: Part, field: string, value: number | string | boolean, label: string): Edit {
    const own = this.drawn(part.id);
    const isChanged = own !== undefined && figureOf(own, field) !== figureOf(part, field);
    const change = { part: part.id, field, value };
    const edit = isChanged ? setInCase({ case: this.operatingCase.id, ...change }) : setField(change);
    return relabelled(edit, isChanged ? `${label} in case ${this.operatingCase.id}` : label);
  }
}

function figureOf(part: Part, field: string): unknown {
  return (part as unknown as Readonly<Record<string, unknown>>)[field];
}

export function relabelled({ apply }: Edit, label: string): Edit {
  return { label, apply };
}

/** A ladder whose rungs are each tried in turn. */
export function stepped(rungs: readonly Candidate[]): Ladder {
  return { rungs, rising: false };
}
