/** One line of the working of an answer, to be followed with a pocket calculator. */
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import type { Origin, PartId } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import type { Basis } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';

/** Where a figure of a line comes from. */
export interface FigureOrigin {
  readonly field: string;
  readonly origin: Origin;
  /** In the field's own unit. */
  readonly range?: readonly [number, number];
}

export interface WorkingResult {
  /** Null where the network does not determine it; `notDetermined` then says why. */
  readonly value: number | null;
  /** A unit as `formatQuantity` knows it: `V`, `A`, `W`, `ohm`, `degC`, `1` … */
  readonly unit: string;
}

export interface WorkingLine {
  /** What the line finds, in words. */
  readonly name: string;
  /** In symbols: `R = R20 · (1 + α · (T − 20))`. */
  readonly formula: string;
  /** The same with the figures and their units in it. */
  readonly withValues: string;
  readonly result: WorkingResult;
  /** Figure of the part's answer that the line reproduces. */
  readonly answers?: Exclude<keyof PartAnswer, 'id' | 'state' | 'undetermined' | 'segmentsA'>;
  readonly origins: readonly FigureOrigin[];
  readonly basis?: Basis;
  readonly notDetermined?: string;
}

/** What the working and the figures of a part are asked with. */
export interface PartRequest {
  readonly job: CheckedJob;
  /** As the job names it, or a cable of an out-and-back run. */
  readonly part: PartId;
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
  readonly tables: Tables;
}
