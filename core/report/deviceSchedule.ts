import { KIND_WORDS } from '../diagram/kindWords.ts';
import type { CheckedJob } from '../job/job.ts';
import type { DiodePart, ShuntPart, SwitchPart } from '../job/part.ts';
import type { Cell, TableBlock } from './document.ts';
import { feet, metres, milliohms, NOT_GIVEN, plain } from './figures.ts';
import { given, id, named, number, partsOf, schedule, text, yesNo } from './schedule.ts';

export function deviceSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Overcurrent devices',
    [
      id('Device'),
      text('Type'),
      id('From'),
      id('To'),
      number('Rating', 'A'),
      number('Rated', 'V DC'),
      number('Interrupts', 'A'),
      { ...number('Distance', 'm'), align: 'right' },
      id('Sheathed'),
      number('Resistance', 'mΩ'),
      id('State'),
    ],
    partsOf(job, 'fuse', 'breaker').map((part) => [
      named(part),
      [
        KIND_WORDS[part.kind],
        part.type,
        part.kind === 'breaker' && part.manualReset === true ? 'manual reset' : undefined,
      ]
        .filter(Boolean)
        .join(', '),
      part.from,
      part.to,
      plain(part.ratingA),
      given(part.ratingV),
      given(part.interruptA),
      part.distanceFromSourceM === undefined
        ? NOT_GIVEN
        : { text: metres(part.distanceFromSourceM), under: feet(part.distanceFromSourceM) },
      yesNo(part.sheathed),
      part.resistanceOhm === undefined ? NOT_GIVEN : milliohms(part.resistanceOhm),
      part.state,
    ]),
    [
      'Distance: unprotected conductor between the source and the device. Interrupts: current that the device can break at the DC voltage of the system.',
    ],
  );
}

export function inlineSchedule(job: CheckedJob): readonly TableBlock[] {
  return schedule(
    'Switches, shunts and diodes',
    [id('Part'), id('Kind'), id('From'), id('To'), number('Rating', 'A'), text('Particulars')],
    partsOf(job, 'switch', 'shunt', 'diode').map((part): readonly Cell[] => [
      named(part),
      KIND_WORDS[part.kind],
      part.from,
      part.to,
      given(part.ratingA),
      particulars(part),
    ]),
  );
}

function particulars(part: SwitchPart | ShuntPart | DiodePart): string {
  if (part.kind === 'shunt') return `${plain(part.ratingMv)} mV at rating`;
  if (part.kind === 'diode') return part.forwardV === undefined ? NOT_GIVEN : `${plain(part.forwardV)} V forward`;
  const told = [
    part.state,
    part.ratingV === undefined ? '' : `${plain(part.ratingV)} V DC`,
    part.loadBreak === undefined ? '' : part.loadBreak ? 'breaks load' : 'not for breaking load',
    part.resistanceOhm === undefined ? '' : `${milliohms(part.resistanceOhm)} mΩ`,
  ];
  return told.filter((words) => words !== '').join(', ');
}
