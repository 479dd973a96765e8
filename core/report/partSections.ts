/** The schedules: what the system is made of, one table a trade, every part of the job in exactly one of them. */
import { ampacitySchedule } from './ampacitySchedule.ts';
import { batterySchedule } from './batterySchedule.ts';
import type { CautionPlace } from './cautions.ts';
import { cautionsAt } from './cautions.ts';
import type { Citations } from './citations.ts';
import { conductorSchedule, jointSchedule } from './conductorSchedule.ts';
import { deviceSchedule, inlineSchedule } from './deviceSchedule.ts';
import type { Block, TableBlock } from './document.ts';
import { cableFaultSchedule, deviceFaultSchedule } from './faultSchedules.ts';
import type { ReportInput } from './input.ts';
import { demandSchedule, inverterSchedule, loadSchedule } from './loadSchedule.ts';
import { sourceSchedules } from './sourceSchedule.ts';

export function partSections(input: ReportInput, citations: Citations): readonly Block[] {
  const { job, tables } = input;
  const groups: readonly {
    readonly title: string;
    readonly place: CautionPlace;
    readonly schedules: readonly TableBlock[];
  }[] = [
    { title: 'Batteries', place: 'batteries', schedules: batterySchedule(job) },
    {
      title: 'Conductors',
      place: 'conductors',
      schedules: [
        ...conductorSchedule(job, tables.conductors),
        ...ampacitySchedule(input, citations),
        ...cableFaultSchedule(input, citations),
        ...jointSchedule(job),
      ],
    },
    {
      title: 'Protective and switching devices',
      place: 'devices',
      schedules: [...deviceSchedule(job), ...deviceFaultSchedule(input, citations), ...inlineSchedule(job)],
    },
    {
      title: 'Loads',
      place: 'loads',
      schedules: [...loadSchedule(job), ...inverterSchedule(job), ...demandSchedule(job)],
    },
    { title: 'Sources of charge', place: 'sources', schedules: sourceSchedules(job) },
  ];
  const blocks: Block[] = [{ kind: 'heading', level: 1, text: 'Parts' }];
  for (const { title, place, schedules } of groups) {
    if (schedules.length === 0) continue;
    blocks.push({ kind: 'heading', level: 2, text: title }, ...cautionsAt(place, job, citations), ...schedules);
  }
  return blocks;
}
