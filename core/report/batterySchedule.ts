import { CHEMISTRY_WORDS } from '../diagram/kindWords.ts';
import type { CheckedJob } from '../job/job.ts';
import type { StringPart } from '../job/part.ts';
import type { TableBlock } from './document.ts';
import { milliohms, NOT_GIVEN, percent, plain } from './figures.ts';
import { given, id, named, number, partsOf, schedule, text } from './schedule.ts';

export function batterySchedule(job: CheckedJob): readonly TableBlock[] {
  const strings = partsOf(job, 'string');
  const build = schedule(
    'Battery schedule',
    [
      id('String'),
      text('Chemistry'),
      id('Blocks'),
      number('Capacity', 'Ah'),
      number('Charge', '%'),
      number('Age', 'years'),
      id('Plus'),
      id('Minus'),
      id('Midpoint'),
    ],
    strings.map((part) => [
      named(part),
      CHEMISTRY_WORDS[part.chemistry],
      `${part.blocksInSeries} × ${plain(part.blockNominalV)} V`,
      plain(part.capacityAh),
      part.given.has('stateOfCharge') ? percent(part.stateOfCharge) : NOT_GIVEN,
      given(part.ageYears),
      part.plus,
      part.minus,
      part.midpoint ?? NOT_GIVEN,
    ]),
    strings.some((part) => part.chemistry === 'flooded' || part.chemistry === 'agm' || part.chemistry === 'gel')
      ? ['Capacity of lead-acid: at the 20 h rate.']
      : [],
  );
  return [...build, ...batteryFigures(strings)];
}

function batteryFigures(strings: readonly StringPart[]): readonly TableBlock[] {
  return schedule(
    'Electrical figures of the strings',
    [
      id('String'),
      number('Rest volts', 'V'),
      number('Resistance', 'mΩ'),
      number('Links', 'mΩ'),
      number('Temperature', '°C'),
      number('Charge limit', 'A'),
      number('Discharge limit', 'A'),
      number('Short circuit', 'A'),
    ],
    strings.map((part) => [
      part.id,
      given(part.emfV),
      part.resistanceOhm === undefined ? NOT_GIVEN : milliohms(part.resistanceOhm),
      part.given.has('linkOhm') ? milliohms(part.linkOhm) : NOT_GIVEN,
      given(part.temperatureDegC),
      given(part.maxChargeA),
      given(part.maxDischargeA),
      given(part.shortCircuitA),
    ]),
    [
      'Rest volts, resistance and links are of the whole string. What the solve took where they were not given stands under What was assumed.',
    ],
  );
}
