import type { CheckedJob } from '../job/job.ts';
import type { TableBlock } from './document.ts';
import { NOT_GIVEN, percent, plain } from './figures.ts';
import { given, id, named, number, partsOf, schedule, text, yesNo } from './schedule.ts';

export function sourceSchedules(job: CheckedJob): readonly TableBlock[] {
  return [...arraySchedule(job), ...controllerSchedule(job), ...chargerSchedule(job)];
}

function arraySchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Solar arrays',
    [
      id('Array'),
      id('Plus'),
      id('Minus'),
      text('Modules'),
      number('Voc', 'V'),
      number('Isc', 'A'),
      number('Vmp', 'V'),
      number('Imp', 'A'),
      text('Voc change'),
      number('Largest fuse', 'A'),
      text('Tilt, azimuth'),
    ],
    partsOf(job, 'array').map((part) => [
      named(part),
      part.plus,
      part.minus,
      `${part.modulesInSeries} in series × ${part.stringsInParallel}`,
      plain(part.vocV),
      plain(part.iscA),
      plain(part.vmpV),
      plain(part.impA),
      part.vocPerDegC === undefined ? NOT_GIVEN : `${plain(Number((part.vocPerDegC * 100).toPrecision(4)))} % per °C`,
      given(part.maxFuseA),
      part.tiltDeg === undefined && part.azimuthDeg === undefined
        ? NOT_GIVEN
        : `${given(part.tiltDeg)}°, ${given(part.azimuthDeg)}°`,
    ]),
    ['Volts and amps are of one module at standard test conditions.'],
  );
}

function controllerSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Solar controllers and DC converters',
    [
      id('Part'),
      text('Kind'),
      text('Input from'),
      text('Output to'),
      number('Output limit', 'A'),
      number('Holds', 'V'),
      number('Input limit', 'V'),
      id('Efficiency'),
      id('On'),
    ],
    partsOf(job, 'controller', 'converter').map((part) => [
      named(part),
      part.kind === 'controller' ? `solar controller, ${part.type.toUpperCase()}` : 'DC converter',
      `${part.from.plus}, ${part.from.minus}`,
      `${part.to.plus}, ${part.to.minus}`,
      plain(part.outputA),
      plain(part.kind === 'controller' ? part.setpointV : part.outputV),
      part.kind === 'controller' ? plain(part.maxInputV) : NOT_GIVEN,
      part.efficiency === undefined ? NOT_GIVEN : `${percent(part.efficiency)} %`,
      part.kind === 'controller' ? 'yes' : yesNo(part.on),
    ]),
  );
}

function chargerSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Chargers',
    [
      id('Charger'),
      text('Fed by'),
      id('Plus'),
      id('Minus'),
      number('Output limit', 'A'),
      number('Holds', 'V'),
      id('On'),
    ],
    partsOf(job, 'charger').map((part) => [
      named(part),
      part.source ?? NOT_GIVEN,
      part.plus,
      part.minus,
      plain(part.outputA),
      plain(part.setpointV),
      yesNo(part.on),
    ]),
  );
}
