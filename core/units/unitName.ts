/** The units that quantities are kept in inside the program, and how each kind of quantity is spoken of. */

/** One unit for each kind of quantity; `1` is a fraction, `1/K` a fraction per kelvin. */
export type UnitName =
  | 'm'
  | 'ohm'
  | 'W'
  | 'A'
  | 'V'
  | 'mV'
  | 'Ah'
  | 'Wh'
  | 'degC'
  | 's'
  | 'h'
  | 'day'
  | 'year'
  | 'deg'
  | '1'
  | '1/K'
  | 'W/m2'
  | 'kWh/m2/day'
  | 'cm2'
  | 'm3/h'
  | 'A2s';

interface UnitKind {
  /** What the quantity is called in a sentence, with its article. */
  readonly noun: string;
  /** How it may be written. */
  readonly example: string;
  /** The same unit as the unit library writes it; `undefined` where the words of the kind are a closed list of our own. */
  readonly library: string | undefined;
}

export const unitKinds: Readonly<Record<UnitName, UnitKind>> = {
  m: { noun: 'a length', example: '3.2 m or 10 ft', library: 'm' },
  ohm: { noun: 'a resistance', example: '2.1 mOhm or 0.5 ohm', library: 'ohm' },
  W: { noun: 'a power', example: '60 W or 2 kW', library: 'W' },
  A: { noun: 'a current', example: '12 A or 250 mA', library: 'A' },
  V: { noun: 'a voltage', example: '12.6 V or 210 mV', library: 'V' },
  mV: { noun: 'a voltage', example: '50 mV or 0.05 V', library: 'mV' },
  Ah: { noun: 'a charge', example: '200 Ah', library: 'A h' },
  Wh: { noun: 'an energy', example: '800 Wh or 1.2 kWh', library: 'W h' },
  degC: { noun: 'a temperature', example: '25 degC or 77 degF', library: undefined },
  s: { noun: 'a time', example: '5 s or 2 min', library: 's' },
  h: { noun: 'a time', example: '3 h or 90 min', library: 'h' },
  day: { noun: 'a time', example: '3 days or 36 h', library: 'day' },
  year: { noun: 'a time', example: '4 years or 18 months', library: 'year' },
  deg: { noun: 'an angle', example: '35 deg', library: 'deg' },
  '1': { noun: 'a fraction', example: '0.85 or 85 %', library: undefined },
  '1/K': { noun: 'a fraction per degree', example: '-0.0029 or -0.29 %/degC', library: undefined },
  'W/m2': { noun: 'an irradiance', example: '850 W/m2', library: 'W/m^2' },
  'kWh/m2/day': { noun: 'a daily irradiation', example: '3.4 kWh/m2/day', library: undefined },
  cm2: { noun: 'an area', example: '150 cm2 or 20 in2', library: undefined },
  'm3/h': { noun: 'a flow of air', example: '12 m3/h or 7 cfm', library: undefined },
  A2s: { noun: 'a let-through I²t', example: '20000 A2s', library: undefined },
};

/** What a quantity of this unit is, in words: `a length such as 3.2 m or 10 ft`. */
export function describeUnit(unit: UnitName): string {
  return `${unitKinds[unit].noun} such as ${unitKinds[unit].example}`;
}
