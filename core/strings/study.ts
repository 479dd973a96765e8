/** The whole study of the strings of a job: the answers of the other files of this folder, together. */
import { stringSource } from '../battery/stringSource.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById, partsInCase } from '../job/job.ts';
import type { PartId } from '../job/part.ts';
import type { BatteryModel, OperatingPoint } from '../network/answer.ts';
import { ambientOf } from '../network/circuit.ts';
import { operatingPoint } from '../network/operatingPoint.ts';
import { withoutPairs } from '../network/wiring.ts';
import type { Tables } from '../tables/tables.ts';
import type {
  AtRest,
  BandStudy,
  CurrentLimit,
  DriftRequest,
  DriftStudy,
  FromReadings,
  Joining,
  LayoutStudy,
  LeadStudy,
  OneOutStudy,
  SeriesImbalance,
  SharingCase,
} from './answer.ts';
import { bandOf } from './band/band.ts';
import { type Bank, banksOf } from './banks.ts';
import { driftOf } from './drift/drift.ts';
import { joiningOf } from './joining/joining.ts';
import { joinPairs } from './joining/joinPairs.ts';
import type { JoinSideAsk } from './joining/joinSide.ts';
import { layoutsOf } from './layouts/layouts.ts';
import { leadToleranceOf } from './layouts/leads.ts';
import { fromReadings } from './readings/fromReadings.ts';
import { seriesOf } from './readings/series.ts';
import { atRestOf } from './sharing/circulating.ts';
import { stringLimits } from './sharing/currentLimit.ts';
import { heaviestCase, oneOutOf } from './sharing/oneOut.ts';
import { sharingOf } from './sharing/sharing.ts';

/** Two sides to be joined, and the most that may flow between them where that is not to come from fuses, labels and cables. */
export interface JoinAsk {
  readonly a: JoinSideAsk;
  readonly b: JoinSideAsk;
  readonly limitA?: number | undefined;
}

export interface StudyRequest {
  /** Without missing figures. */
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly cases: readonly OperatingCase[];
  /** In the order in which they are to stand in the answer. */
  readonly models: readonly BatteryModel[];
  /** Else the pairs that are worth telling, as they stand. */
  readonly joins?: readonly JoinAsk[] | undefined;
  /** What joins two sides, both ways together; else from the drawing. */
  readonly leadOhm?: number | undefined;
  /** Of the band. 0 leaves it out. */
  readonly draws: number;
  readonly seed: number;
  readonly drift?: DriftRequest | undefined;
  /** Parts of a hundred done, now and then. */
  readonly progress?: (done: number, of: number) => void;
}

/** A string before anything flows. */
export interface RestingString {
  readonly id: PartId;
  /** Whole string. */
  readonly emfV: number;
  readonly blockV: number;
  /** What it may be charged with. */
  readonly chargeLimit: CurrentLimit | null;
}

export interface StringsStudy {
  /** As drawn, two or more branches or not. */
  readonly banks: readonly Bank[];
  /** Settings' share limit: how far from its fair share a string may be before it is worth a look. */
  readonly shareLimit: number;
  readonly resting: readonly RestingString[];
  /** Each case by each model, case by case. */
  readonly cases: readonly SharingCase[];
  /** By the battery over minutes, and in the first second. */
  readonly atRest: AtRest;
  readonly atRestFirst: AtRest;
  readonly joining: readonly Joining[];
  /** The joints were asked for; else they are the usual ones. */
  readonly joinsAsked: boolean;
  /** Why a pair has no answer, one sentence each. */
  readonly joiningMissing: readonly string[];
  /** Case that layouts, leads, losses and band are about: the heaviest discharge among those asked; null where none discharges. */
  readonly judgedCase: string | null;
  readonly layouts: LayoutStudy | null;
  readonly leads: LeadStudy | null;
  readonly oneOut: readonly OneOutStudy[];
  readonly band: BandStudy | null;
  readonly series: readonly SeriesImbalance[];
  readonly fromReadings: FromReadings;
  readonly drift: DriftStudy | null;
}

/** Parts of a hundred of the work, by experience on banks of a few strings. */
const SHARES_OF_WORK = { sharing: 20, layouts: 40, band: 90, drift: 100 } as const;

/** Everything about the strings of a job; nothing in it is decided by chance but the band, and that by its seed. */
export function studyStrings(request: StudyRequest): StringsStudy {
  const { job, tables, cases, models, progress } = request;
  const banks = banksOf(withoutPairs(job.parts));
  const points = solved(request);
  const sharing = cases.flatMap((operatingCase) =>
    models.map((model) => sharingOf({ job, tables, operatingCase, model, ...pointOf(points, operatingCase, model) })),
  );
  progress?.(SHARES_OF_WORK.sharing, 100);
  const judged = heaviestCase({ job, tables, points: points.filter(({ model }) => model === models[0]) });
  return {
    banks,
    shareLimit: job.settings.shareLimit,
    resting: restingOf(request),
    cases: sharing,
    atRest: atRestOf({ job, tables, model: 'slow' }),
    atRestFirst: atRestOf({ job, tables, model: 'fast' }),
    ...joiningIn(request),
    joinsAsked: request.joins !== undefined,
    judgedCase: judged?.id ?? null,
    ...judgedOf(request, hasSeveral(banks) ? judged : undefined),
    series: seriesOf({ job, tables, points }),
    fromReadings: fromReadings({ job, tables }),
    drift: request.drift === undefined ? null : driftIn(request, request.drift),
  };
}

function joiningIn({ job, tables, joins, leadOhm }: StudyRequest): Pick<StringsStudy, 'joining' | 'joiningMissing'> {
  const asks = joins ?? usualJoins(job);
  const answers = asks.map((ask) => joiningOf({ job, tables, ...ask, leadOhm }));
  return {
    joining: answers.flatMap((answer) => ('missing' in answer ? [] : [answer])),
    joiningMissing: answers.flatMap((answer) => ('missing' in answer ? [answer.missing] : [])),
  };
}

/** Sides of unlike nominal volts are never joined, so nobody is told what that would do unless they ask. */
function usualJoins(job: CheckedJob): readonly JoinAsk[] {
  const nominalV = (ids: readonly PartId[]) => {
    const banks = banksOf(withoutPairs(job.parts)).flatMap(({ branches }) => branches);
    const branch = banks.find(({ strings }) => strings.some(({ id }) => ids.includes(id)));
    return (branch?.strings ?? []).reduce((sum, one) => sum + one.blocksInSeries * one.blockNominalV, 0);
  };
  return joinPairs(job)
    .filter(([a, b]) => Math.abs(nominalV(a) - nominalV(b)) <= UNLIKE * nominalV(a))
    .map(([a, b]) => ({ a: { strings: a }, b: { strings: b } }));
}
/** 12.8 V lithium stands in for 12 V. */
const UNLIKE = 0.1;

function driftIn({ job, tables, progress }: StudyRequest, request: DriftRequest): DriftStudy {
  return driftOf({ job, tables, request, ...within(progress, SHARES_OF_WORK.band, SHARES_OF_WORK.drift) });
}

/** Whether there is anything to say of the strings of a job: two side by side, or readings that may tell of one. */
export function isWorthStudying(job: CheckedJob): boolean {
  return (
    hasSeveral(banksOf(withoutPairs(job.parts))) || job.readings.some(({ quantity }) => quantity !== 'temperature')
  );
}

function hasSeveral(banks: readonly Bank[]): boolean {
  return banks.some(({ branches }) => branches.length > 1);
}

function solved({ job, tables, cases, models }: StudyRequest): readonly OperatingPoint[] {
  return cases.flatMap((operatingCase) => models.map((model) => operatingPoint({ job, tables, operatingCase, model })));
}

function pointOf(
  points: readonly OperatingPoint[],
  { id }: OperatingCase,
  model: BatteryModel,
): { readonly point?: OperatingPoint } {
  const point = points.find((one) => one.case === id && one.model === model);
  return point === undefined ? {} : { point };
}

/** What is worked out for one case only. */
function judgedOf(
  { job, tables, models, draws, seed, progress }: StudyRequest,
  operatingCase: OperatingCase | undefined,
): Pick<StringsStudy, 'layouts' | 'leads' | 'oneOut' | 'band'> {
  const model = models[0];
  if (operatingCase === undefined || model === undefined) return { layouts: null, leads: null, oneOut: [], band: null };
  const asked = { job, tables, operatingCase, model };
  return {
    layouts: layoutsOf({ ...asked, ...within(progress, SHARES_OF_WORK.sharing, SHARES_OF_WORK.layouts) }),
    leads: leadToleranceOf({ ...asked, limit: job.settings.shareLimit }),
    oneOut: oneOutOf(asked),
    band:
      draws === 0
        ? null
        : bandOf({ ...asked, draws, seed, ...within(progress, SHARES_OF_WORK.layouts, SHARES_OF_WORK.band) }),
  };
}

/** The progress of one piece of the work as progress of the whole. */
function within(
  progress: StudyRequest['progress'],
  from: number,
  to: number,
): { readonly progress?: (done: number, of: number) => void } {
  if (progress === undefined) return {};
  return { progress: (done, of) => progress(from + ((to - from) * done) / Math.max(of, 1), 100) };
}

function restingOf({ job, tables }: StudyRequest): readonly RestingString[] {
  const atRest = caseById(job, 'at-rest')!;
  const context = { model: 'slow', ambientDegC: ambientOf(job, atRest), tables: tables.chemistry } as const;
  return partsInCase(job, atRest).flatMap((part) => {
    if (part.kind !== 'string') return [];
    const emfV = stringSource(part, context).emfV.value;
    const { charge } = stringLimits(part, tables.chemistry);
    return [{ id: part.id, emfV, blockV: emfV / part.blocksInSeries, chargeLimit: charge }];
  });
}
