/** The figures of the site and the thresholds of the job: what each is called, and what it is for. */
import type { UnitName } from '../../../core/api.ts';

export interface JobFigure {
  /** As in the job file: `site.latitudeDeg`. */
  readonly path: string;
  readonly label: string;
  /** What it is used for, in a line. */
  readonly use: string;
  readonly unit: UnitName | 'count' | 'flag';
  /** What is taken where it is not given; absent where then nothing is assumed, or the practice says. */
  readonly standard?: number;
}

export const siteFigures: readonly JobFigure[] = [
  {
    path: 'site.latitudeDeg',
    label: 'Latitude',
    use: 'North positive, south negative. How high the sun stands.',
    unit: 'deg',
  },
  {
    path: 'site.albedo',
    label: 'Light thrown back by the ground',
    use: 'From 0 to 1: grass about 0.2, fresh snow up to 0.8 (common practice, no source). For tilted arrays.',
    unit: '1',
  },
];

/** What the place is like, beyond its air: yes or no. */
export const placeFlags: readonly JobFigure[] = [
  {
    path: 'site.gasolineSpace',
    label: 'Petrol (gasoline) engine or tank',
    use: 'Is there one in a closed space of the vessel or vehicle? Sparks there are a matter of life.',
    unit: 'flag',
  },
  {
    path: 'site.dampSpace',
    label: 'Damp or salty air',
    use: 'Asks for tinned copper.',
    unit: 'flag',
  },
  {
    path: 'site.sourceSign',
    label: 'Signs that name every source',
    use: 'Are they fitted where more than one source feeds a box?',
    unit: 'flag',
  },
];

export const airFigures: readonly JobFigure[] = [
  {
    path: 'site.ambientMinDegC',
    label: 'Coldest air',
    use: 'Highest open-circuit volts of an array; batteries near freezing.',
    unit: 'degC',
  },
  {
    path: 'site.ambientDesignDegC',
    label: 'Usual air',
    use: 'Temperature of cables and batteries where nothing else is said.',
    unit: 'degC',
  },
  {
    path: 'site.ambientMaxDegC',
    label: 'Hottest air',
    use: 'What cables may still carry on the hottest day.',
    unit: 'degC',
  },
];

/** Without a published source, all of them; the defaults are those that the job file states. */
export const thresholds: readonly JobFigure[] = [
  {
    path: 'settings.dropCritical',
    label: 'Volts lost on the way, critical loads',
    use: 'Share of the nominal volts. Left empty: what the rule book says.',
    unit: '1',
  },
  {
    path: 'settings.dropOrdinary',
    label: 'Volts lost on the way, other loads',
    use: 'Share of the nominal volts. Left empty: what the rule book says.',
    unit: '1',
  },
  {
    path: 'settings.nominalV',
    label: 'Nominal volts of the system',
    use: 'What the shares refer to. Left empty: what the battery strings are called.',
    unit: 'V',
  },
  {
    path: 'settings.cableStopFactor',
    label: 'Cable overload that is told as STOP',
    use: 'Amps over what the cable may carry; below, it is FIX.',
    unit: '1',
    standard: 1.2,
  },
  {
    path: 'settings.continuousFactor',
    label: 'Margin for loads of 3 hours and more',
    use: 'On the continuous amps, for fuses and cables.',
    unit: '1',
    standard: 1.25,
  },
  {
    path: 'settings.shareLimit',
    label: 'Strings apart from their fair share',
    use: 'From here on a look is asked for.',
    unit: '1',
    standard: 0.1,
  },
  {
    path: 'settings.maxParallelStrings',
    label: 'Strings in parallel',
    use: 'With more than these a look is asked for.',
    unit: 'count',
    standard: 4,
  },
  {
    path: 'settings.ageGapYears',
    label: 'Age between parallel strings',
    use: 'With more than this a look is asked for.',
    unit: 'year',
    standard: 1,
  },
  {
    path: 'settings.midpointWatch',
    label: 'Middle of a string off centre: watch',
    use: 'Share of the volts of the whole string.',
    unit: '1',
    standard: 0.005,
  },
  {
    path: 'settings.midpointAct',
    label: 'Middle of a string off centre: act',
    use: 'Share of the volts of the whole string.',
    unit: '1',
    standard: 0.01,
  },
  {
    path: 'settings.faultClearS',
    label: 'A weak fault is off after',
    use: 'The weakest fault is to open its fuse or breaker by then.',
    unit: 's',
    standard: 5,
  },
];

const byPath = new Map(
  [...siteFigures, ...placeFlags, ...airFigures, ...thresholds].map((figure) => [figure.path, figure]),
);

export function jobFigure(path: string): JobFigure | undefined {
  return byPath.get(path);
}
