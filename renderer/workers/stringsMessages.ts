/** What can be asked of a worker of the stage Strings, each about one study of the bank. */
import type {
  AtRest,
  BandStudy,
  Bank,
  BankChange,
  BatteryModel,
  Draft,
  DriftRequest,
  DriftStudy,
  FromReadings,
  Joining,
  JoiningRequest,
  LayoutStudy,
  LeadStudy,
  OneOutStudy,
  SeriesImbalance,
  SharingCase,
} from '../../core/api.ts';

/** One case, fast and slow; which strings work together may change with what it switches. */
export interface CaseNow extends Readonly<Record<BatteryModel, SharingCase>> {
  readonly banks: readonly Bank[];
}

/** The bank as it stands: what each case shares and what flows at rest. Quick enough to follow every edit. */
export interface BankNow {
  /** As drawn. */
  readonly banks: readonly Bank[];
  /** By case id. */
  readonly cases: ReadonlyMap<string, CaseNow>;
  readonly atRest: AtRest;
  readonly series: readonly SeriesImbalance[];
  readonly fromReadings: FromReadings;
  /** What the drift begins with until the person says otherwise. */
  readonly usualCycle: DriftRequest | null;
}

/** A change to the bank, with the job that it leaves: an edit is a function and cannot travel. */
export interface TriedChange extends Omit<BankChange, 'edit'> {
  readonly leaves: Draft;
}

export interface LayoutsAnswer {
  readonly layouts: LayoutStudy | null;
  readonly leads: LeadStudy;
}

export interface InCase {
  readonly caseId: string;
  readonly model: BatteryModel;
}

/** Two sides and what joins them, as the person asks. */
export type JoiningQuestion = Omit<JoiningRequest, 'job' | 'tables'>;

/** What can be asked, by name: what goes with the question, and the answer. */
export interface Studies {
  readonly now: { readonly asks: Record<string, never>; readonly answers: BankNow };
  readonly oneOut: { readonly asks: InCase; readonly answers: readonly OneOutStudy[] };
  readonly joining: { readonly asks: JoiningQuestion; readonly answers: Joining | { readonly missing: string } };
  readonly layouts: { readonly asks: InCase; readonly answers: LayoutsAnswer };
  readonly changes: { readonly asks: InCase; readonly answers: readonly TriedChange[] };
  readonly band: {
    readonly asks: InCase & { readonly draws: number; readonly seed: number };
    readonly answers: BandStudy | null;
  };
  readonly drift: { readonly asks: DriftRequest; readonly answers: DriftStudy };
}
export type StudyName = keyof Studies;
