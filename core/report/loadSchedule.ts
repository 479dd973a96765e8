import type { CheckedJob } from '../job/job.ts';
import type { LoadPart } from '../job/part.ts';
import type { Cell, TableBlock } from './document.ts';
import { NOT_GIVEN, percent, plain } from './figures.ts';
import { given, id, named, number, partsOf, schedule, text, yesNo } from './schedule.ts';

export function loadSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Loads',
    [
      id('Load'),
      id('Plus'),
      id('Minus'),
      text('Draws'),
      id('On'),
      number('Lowest', 'V'),
      number('Highest', 'V'),
      text('Start-up'),
      id('Runs 3 h or more'),
      id('Class'),
    ],
    partsOf(job, 'load').map((part) => [
      named(part),
      part.plus,
      part.minus,
      drawText(part),
      yesNo(part.on),
      given(part.minimumV),
      given(part.maximumV),
      surgeText(part.surgeW, part.surgeS),
      yesNo(part.continuous),
      part.dropClass ?? NOT_GIVEN,
    ]),
  );
}
function drawText(part: LoadPart): string {
  if (part.powerW !== undefined) return `${plain(part.powerW)} W, constant`;
  if (part.currentA !== undefined) return `${plain(part.currentA)} A, constant`;
  return part.resistanceOhm === undefined ? NOT_GIVEN : `${plain(part.resistanceOhm)} Ω`;
}
function surgeText(surgeW: number | undefined, surgeS?: number): string {
  if (surgeW === undefined) return NOT_GIVEN;
  return surgeS === undefined ? `${plain(surgeW)} W` : `${plain(surgeW)} W for ${plain(surgeS)} s`;
}

export function inverterSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Inverters',
    [
      id('Inverter'),
      id('Plus'),
      id('Minus'),
      number('Rated', 'W'),
      number('Output now', 'W'),
      number('Surge', 'W'),
      text('Efficiency'),
      number('Idle', 'W'),
      number('Cut-off', 'V'),
      id('On'),
    ],
    partsOf(job, 'inverter').map((part) => [
      named(part),
      part.plus,
      part.minus,
      plain(part.ratedW),
      given(part.acPowerW),
      given(part.surgeW),
      efficiencyText(part.efficiency),
      given(part.standbyW),
      given(part.cutoffV),
      yesNo(part.on),
    ]),
  );
}
function efficiencyText(efficiency: number | readonly (readonly [number, number])[] | undefined): string {
  if (efficiency === undefined) return NOT_GIVEN;
  if (typeof efficiency === 'number') return `${percent(efficiency)} %`;
  return efficiency.map(([fraction, value]) => `${percent(value)} % at ${percent(fraction)} %`).join('; ');
}

export function demandSchedule(job: CheckedJob): readonly TableBlock[] {
  const rows = job.demand.map((row, index): readonly Cell[] => {
    const daily = row.hoursPerDay.map((hours) => hours * row.powerW * row.quantity);
    return [
      row.label ?? `row ${index + 1}`,
      plain(row.quantity),
      plain(row.powerW),
      row.supply === 'dc' ? 'DC' : 'AC',
      span(row.hoursPerDay),
      span(daily),
      row.surgeW === undefined ? NOT_GIVEN : plain(row.surgeW),
      yesNo(row.together),
    ];
  });
  return schedule(
    'Demand, as listed for sizing',
    [
      text('What'),
      number('How many', ''),
      number('Each', 'W'),
      id('Supply'),
      id('Hours a day'),
      id('Wh a day'),
      number('Surge', 'W'),
      id('With the others'),
    ],
    rows,
    rows.length === 0
      ? []
      : [
          'Two figures in a cell: the least and the most of the twelve months. AC rows: at the outlet, before the losses of the inverter.',
        ],
  );
}
function span(months: readonly number[]): string {
  const least = Math.min(...months);
  const most = Math.max(...months);
  const round = (value: number): string => plain(Number(value.toPrecision(4)));
  return least === most ? round(least) : `${round(least)} – ${round(most)}`;
}
