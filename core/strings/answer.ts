/** What the study of a bank of strings answers. Currents of a string are positive on discharge, as in `core/job/part.ts`. */
import type { JunctionId, Origin, PartId } from '../job/part.ts';
import type { BatteryModel, OperatingPoint } from '../network/answer.ts';
import type { Basis } from '../tables/status.ts';

/** A limit on a current, and what it rests on. */
export interface CurrentLimit {
  readonly limitA: number;
  readonly basis: Basis;
}

/** One string in one case. A figure is null where the case has no answer, or where it would mean nothing. */
export interface SharedString {
  readonly id: PartId;
  /** Place of its bank in the list of banks. */
  readonly bank: number;
  readonly currentA: number | null;
  /** Its part of the current of its bank; null while the bank as a whole carries less than one fiftieth of its capacity an hour. */
  readonly share: number | null;
  /** Its part of the capacity of its bank. */
  readonly fairShare: number;
  /** What it would carry at its fair share; null where `share` is. */
  readonly fairA: number | null;
  /** share / fairShare - 1. */
  readonly deviation: number | null;
  /** |current| / capacity, 1/h. */
  readonly cRate: number | null;
  /** What it may give (or take, where it takes). */
  readonly limit: CurrentLimit | null;
  /** It takes while its bank as a whole gives, or gives while its bank takes. */
  readonly opposes: boolean;
  /**
   * Current of the whole bank at which this string's changes sign, on the straight line between rest and this case; null where
   * that line never gets there in the direction of this case.
   */
  readonly signChangeA: number | null;
}

export interface SharingCase {
  readonly case: string;
  readonly model: BatteryModel;
  readonly outcome: OperatingPoint['outcome'];
  readonly strings: readonly SharedString[];
  /** Current of each bank, in the order of the banks. */
  readonly banksA: readonly (number | null)[];
  /** Largest |deviation|. */
  readonly spread: number | null;
}

/** What flows between strings with nothing switched on. */
export interface CirculatingPair {
  /** It gives. */
  readonly from: PartId;
  /** It takes. */
  readonly to: PartId;
  readonly currentA: number;
}

export interface AtRest {
  readonly outcome: OperatingPoint['outcome'];
  readonly strings: readonly { readonly id: PartId; readonly currentA: number }[];
  /**
   * By superposition: what each string's difference in EMF from each other string of its bank drives. Sums to the strings' currents.
   * Strings in series go by the first of them.
   */
  readonly pairs: readonly CirculatingPair[];
  /**
   * Largest amount by which the pairs miss a string's current: what flows to anything that is not a string, or is driven by strings
   * that are not of its bank.
   */
  readonly remainderA: number;
  /** Turned to heat in batteries and wiring by what circulates. */
  readonly lostW: number;
  /** All that the giving strings give. */
  readonly givenA: number;
  /** What that would be over a day if it did not fade. */
  readonly givenAhPerDay: number;
}

/** One side of a joint: a string, a block, or a bank seen as one. */
export interface JoiningLimit {
  /** `fuse F-A`, `charge limit of B`, `cable L-A+`, `C/5 of the smaller` … */
  readonly what: string;
  readonly limitA: number;
  readonly basis: Basis;
}

export interface JoiningMoment {
  readonly seconds: number;
  /** From the fuller to the emptier. */
  readonly currentA: number;
  /** With the resistor in the way; null where none is needed. */
  readonly withResistorA: number | null;
  /** Charge moved so far without the resistor, Ah. */
  readonly movedAh: number;
}

export interface Joining {
  readonly a: string;
  readonly b: string;
  /** The one that gives. */
  readonly giver: string;
  /** EMF of a minus EMF of b. */
  readonly gapV: number;
  /** Fast resistance of both sides and the lead. */
  readonly loopOhm: number;
  readonly leadOhm: number;
  /** First instant. */
  readonly inrushA: number;
  readonly limits: readonly JoiningLimit[];
  /** The least of the limits. */
  readonly limitA: number;
  /** The gap at which the inrush is the limit. */
  readonly safeGapV: number;
  /** True where the inrush is within the limit as things stand. */
  readonly within: boolean;
  /** Time by which 95 % of the charge has moved. */
  readonly settleS: number;
  /** Charge that moves until both rest. */
  readonly movedAh: number;
  /** Turned to heat on the way. */
  readonly lostWh: number;
  /** The resistor that keeps the inrush at the limit; null where none is needed. */
  readonly resistor: {
    readonly ohm: number;
    /** At the first instant. */
    readonly w: number;
    /** That it turns to heat in all. */
    readonly wh: number;
    /** Time after which the two may be joined directly: the gap is then `safeGapV`; null where one side is empty before that. */
    readonly untilS: number | null;
    readonly settleS: number;
  } | null;
  readonly curve: readonly JoiningMoment[];
  /** True where equal volts do not prove equal charge (flat curves): to be said beside the answer. */
  readonly flat: boolean;
  /** On a flat curve: how far apart the states of charge may be at these volts, each as [low, high]. */
  readonly chargeBand: { readonly a: readonly [number, number]; readonly b: readonly [number, number] } | null;
  readonly assumed: readonly string[];
}

export type LayoutKind = 'as-drawn' | 'same-end' | 'opposite-ends' | 'middle' | 'taps' | 'equal-leads' | 'halving-tree';

export interface Layout {
  readonly name: string;
  readonly kind: LayoutKind;
  /** Strings at whose posts plus and minus are taken; null where the bank is tapped at common bars or as drawn. */
  readonly plusAt: PartId | null;
  readonly minusAt: PartId | null;
  /** The same for chargers, where they are tapped apart from the loads. */
  readonly chargePlusAt: PartId | null;
  readonly chargeMinusAt: PartId | null;
  readonly strings: readonly {
    readonly id: PartId;
    readonly currentA: number;
    readonly share: number;
    readonly deviation: number;
  }[];
  readonly spread: number;
  /** The string furthest from its fair share. */
  readonly worst: PartId;
  /** In strings, links and leads. */
  readonly lostW: number;
  /** At the taps. */
  readonly bankV: number;
  /** Cable that it takes between the strings and the taps; null for the bank as drawn where lengths are not known. */
  readonly cableM: number | null;
}

export interface LayoutStudy {
  readonly case: string;
  readonly strings: readonly PartId[];
  /** Current of the bank, discharge positive. */
  readonly bankA: number;
  /** One link of one bar, between neighbours. */
  readonly linkOhm: number;
  readonly spacingM: number;
  /** What was taken for the row of blocks where the drawing does not say, one sentence each. */
  readonly assumed: readonly string[];
  /** As drawn first, then by rising spread. */
  readonly layouts: readonly Layout[];
  /** Name of the one with the least spread whose blocks stay where they lie; of equals the one with the least cable. */
  readonly best: string;
}

/** How equal the leads of one string must be to the others'. */
export interface LeadTolerance {
  readonly string: PartId;
  /** Mean length of its leads as drawn. */
  readonly lengthM: number;
  /** Between these every deviation stays within the limit, the other strings as drawn; null where no length does. */
  readonly shortestM: number | null;
  readonly longestM: number | null;
}
export interface LeadStudy {
  readonly case: string;
  /** Largest |deviation| allowed. */
  readonly limit: number;
  readonly leads: readonly LeadTolerance[];
}

/** One string or device gone. */
export interface OneLoss {
  /** Of strings in series, which are lost together, the first. */
  readonly lost: PartId;
  readonly kind: 'string' | 'device';
  /** Strings that give nothing any more. */
  readonly without: readonly PartId[];
  readonly outcome: OperatingPoint['outcome'];
  /** Loads that ran before and now drop out for want of volts. */
  readonly droppedOut: readonly PartId[];
  /** Those that remain; currents are null where the loads can no longer be had. */
  readonly strings: readonly {
    readonly id: PartId;
    readonly currentA: number | null;
    readonly limit: CurrentLimit | null;
    readonly overLimit: boolean;
  }[];
  /**
   * Bank current, in the direction of the case and signed like it, at which the first remaining string reaches its limit; 0 where one
   * is beyond it at rest already; null where none has a limit or nothing remains.
   */
  readonly largestA: number | null;
  /** What then cuts out, one wave after the other, where everything beyond its limit does; empty where all hold. */
  readonly cascade: readonly (readonly PartId[])[];
}

export interface OneOutStudy {
  readonly case: string;
  readonly bank: number;
  /** Bank current in the case. */
  readonly bankA: number;
  /** Largest bank current with all strings in, in the direction of the case and signed like it. */
  readonly largestA: number | null;
  /** Largest bank current that survives any one loss. */
  readonly survivesA: number | null;
  readonly losses: readonly OneLoss[];
}

/** 5th, 50th and 95th percentile over the draws. */
export interface Percentiles {
  readonly p05: number;
  readonly p50: number;
  readonly p95: number;
}

export interface BandedString {
  readonly id: PartId;
  readonly currentA: Percentiles;
  /** Null where the bank carries next to nothing. */
  readonly deviation: Percentiles | null;
  /** With every figure at its own value. */
  readonly nominalA: number;
}

/** What one assumed figure does to the answer, the others at their values. */
export interface TornadoBar {
  readonly part: PartId;
  /** In words: `resistance of C`, `rest curve of agm (A, B, C)`. */
  readonly label: string;
  readonly quantity: 'emfV' | 'resistanceOhm' | 'currentA' | 'powerW';
  readonly origin: Origin;
  readonly low: number;
  readonly value: number;
  readonly high: number;
  /** Current of the judged string with the figure at its low and at its high. */
  readonly lowA: number;
  readonly highA: number;
  /** d(current of the judged string)/d(figure) by the adjoint, A per unit. */
  readonly perUnit: number;
}

/** The reading that would narrow the answer most. */
export interface SettlingReading {
  readonly kind: 'string-current' | 'rest-volts' | 'two-load-resistance';
  readonly part: PartId;
  /** 5th to 95th percentile of the judged string's current once it is taken. */
  readonly leavesA: number;
  /** The same without it. */
  readonly nowA: number;
  readonly text: string;
}

export interface BandStudy {
  readonly case: string;
  readonly model: BatteryModel;
  readonly draws: number;
  /** Draws without an operating point; they count as outside every limit. */
  readonly unsolved: number;
  readonly seed: number;
  readonly strings: readonly BandedString[];
  /** The string that the verdict, the tornado and the reading are about: furthest off at the figures' own values. */
  readonly judged: PartId;
  readonly verdict: {
    /** Settings' share limit. */
    readonly limit: number;
    readonly nominalWithin: boolean;
    /** Part of the draws in which every string is within the limit. */
    readonly within: number;
    /** True where (nearly) every draw says what the figures' own values say. */
    readonly holds: boolean;
    readonly text: string;
  };
  readonly tornado: readonly TornadoBar[];
  readonly reading: SettlingReading | null;
  /** True where no figure of a string is assumed: all were measured or read from a label. */
  readonly allGiven: boolean;
}

/** Volts along a string of blocks, or the two halves of one, from a solve or from readings. */
export interface SeriesBlock {
  readonly name: string;
  readonly voltageV: number;
  /** From the mean of the blocks; millivolts first. */
  readonly fromMeanV: number;
  /** As a fraction of the mean. */
  readonly fromMean: number;
}
export interface SeriesImbalance {
  /** Strings it is about, from minus to plus. */
  readonly strings: readonly PartId[];
  readonly case: string | null;
  /** Of the readings. */
  readonly set?: 'as-found' | 'as-left';
  readonly from: 'readings' | 'solved';
  readonly totalV: number;
  /** From minus to plus. */
  readonly blocks: readonly SeriesBlock[];
  /** Where the middle of the string is known: upper half minus lower half, and the same on both bases in use. */
  readonly midpoint: {
    readonly lowerV: number;
    readonly upperV: number;
    readonly differenceV: number;
    /** differenceV / total. */
    readonly onTotal: number;
    /** differenceV / mean half: twice the other. */
    readonly onMeanHalf: number;
  } | null;
  /** What to say: the base of the percentage; that a good midpoint hides bad blocks. */
  readonly remarks: readonly string[];
}

export interface WithUncertainty {
  readonly value: number;
  /** Standard uncertainty. */
  readonly standard: number;
}
export interface StringFromReadings {
  readonly string: PartId;
  /** The strings in series with it that the figures are of as well; none where its own volts were read. */
  readonly together?: readonly PartId[];
  /** Of the readings. */
  readonly set?: 'as-found' | 'as-left';
  /** The two cases. */
  readonly cases: readonly [string, string];
  readonly emfV: WithUncertainty;
  /** True where the volts were read at the string's own terminals, so that its leads are not in the figures. */
  readonly atTerminals?: boolean;
  /** From bank terminals: leads included. */
  readonly resistanceOhm: WithUncertainty;
  /** What the job expects between the same points. */
  readonly expectedOhm: number;
  readonly expectedEmfV: number;
  /** Change of current over its uncertainty: under about 3 the answer is no answer. */
  readonly significance: number;
  readonly text: string;
}

/** Fuller, or sick? What each cause would show. */
export interface TieBreakRow {
  readonly cause: 'fuller' | 'high-resistance' | 'bad-joint' | 'shorted-cell';
  readonly atRest: string;
  readonly onLoad: string;
  readonly onCharge: string;
  readonly acrossJoint: string;
  /** What the readings say of it. */
  readonly agrees: 'yes' | 'no' | 'cannot-tell';
}
export interface TieBreak {
  readonly string: PartId;
  readonly rows: readonly TieBreakRow[];
  /** The reading that would settle it. */
  readonly next: string;
}
export interface FromReadings {
  readonly strings: readonly StringFromReadings[];
  readonly tieBreaks: readonly TieBreak[];
  /** At rest the strings' currents must add up to nothing: what they add up to, where they were read. */
  readonly restSumA: WithUncertainty | null;
  /** What that sum says, where there is one. */
  readonly restText?: string;
  /** Why nothing could be made of the readings, where nothing could. */
  readonly missing: readonly string[];
}

/** One stretch of a cycle. */
export interface CycleStep {
  readonly case: string;
  readonly hours: number;
}
export interface DriftRequest {
  /** Run through again and again. */
  readonly cycle: readonly CycleStep[];
  readonly cycles: number;
  /** Longest step, s. */
  readonly stepS: number;
}

export interface DriftedString {
  readonly id: PartId;
  /** Which half of a string with a junction at its middle: each half has a charge of its own. */
  readonly half: 'upper' | 'lower' | null;
  /** Throughput: given and taken, Ah. */
  readonly givenAh: number;
  readonly takenAh: number;
  /** Taken but not kept (gassing). */
  readonly gassedAh: number;
  /** Share of what the bank gave. */
  readonly share: number | null;
  readonly lowestCharge: number;
  readonly highestCharge: number;
  readonly endCharge: number;
  /** Largest discharge current, A. */
  readonly largestA: number;
}
export interface DriftMoment {
  readonly hours: number;
  readonly case: string;
  /** By string, in the order of `strings`. */
  readonly currentA: readonly number[];
  readonly stateOfCharge: readonly number[];
  readonly bankV: number;
}
export interface DriftStudy {
  readonly cycle: readonly CycleStep[];
  readonly cycles: number;
  readonly hours: number;
  readonly steps: number;
  readonly strings: readonly DriftedString[];
  /** Thinned for drawing: at most some twelve hundred. */
  readonly moments: readonly DriftMoment[];
  /** At the end of each cycle: charge of each string. */
  readonly cycleEnds: readonly (readonly number[])[];
  /** What does not add up: Ah and Wh, over the throughput. */
  readonly books: {
    readonly throughputAh: number;
    readonly mismatchAh: number;
    readonly throughputWh: number;
    readonly mismatchWh: number;
    readonly lostWh: number;
    readonly gassedWh: number;
  };
  /** Told as it happened: a string empty, a load dropped out, a limit passed. */
  readonly events: readonly { readonly hours: number; readonly part: PartId | null; readonly text: string }[];
  readonly assumed: readonly string[];
}

/** A change to the bank, tried on a copy of the job. */
export interface BankMeasure {
  readonly worst: PartId;
  /** |deviation| of the worst string. */
  readonly spread: number;
  readonly worstA: number;
  readonly bankV: number;
  readonly lostW: number;
  readonly strings: readonly {
    readonly id: PartId;
    readonly currentA: number;
    /** What it would carry at its fair share. */
    readonly fairA: number;
    readonly deviation: number | null;
  }[];
}

/** Where a bank is tapped, by its junctions. */
export interface BankTerminals {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}
