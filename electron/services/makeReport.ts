/** From a checked job to its paper, for the command line and the screens alike. */
import {
  type BatteryModel,
  buildReport,
  type CheckedJob,
  isWorthStudying,
  type OperatingCase,
  type OperatingPoint,
  protectionFigures,
  type ReportDocument,
  type ReportOptions,
  runChecks,
  studyStrings,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { solveCases } from './solveCases.ts';

export interface ReportRequest {
  /** Without missing figures. */
  readonly job: CheckedJob;
  readonly cases: readonly OperatingCase[];
  readonly model?: BatteryModel | undefined;
  readonly options: ReportOptions;
}

export interface MadeReport {
  readonly document: ReportDocument;
  readonly points: readonly OperatingPoint[];
}

const bothModels: readonly BatteryModel[] = ['slow', 'fast'];
/** Enough for percentiles on paper, and still done at once. */
const drawsOfReport = 400;

export function makeReport({ job, cases, model, options }: ReportRequest): MadeReport {
  const points = solveCases(job, cases, model);
  const checkReport = runChecks({ job, tables, cases, points });
  const strings = isWorthStudying(job)
    ? studyStrings({ job, tables, cases, models: bothModels, draws: drawsOfReport, seed: 1 })
    : undefined;
  const protection = protectionFigures({ job, tables, cases, points });
  return { document: buildReport({ job, tables, points, checkReport, strings, protection, options }), points };
}

/** The bytes of the PDF. Its writer takes longer to load than all the rest, so it is loaded when it is needed. */
export async function pdfOf(document: ReportDocument): Promise<Uint8Array> {
  const { renderPdf } = await import('../pdf/renderPdf.ts');
  return await renderPdf(document);
}
