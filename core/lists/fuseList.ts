/** Fuses and breakers: what to buy, where it goes and what it protects. */
import { protectedBy } from '../checks/protectedCables.ts';
import { KIND_WORDS } from '../diagram/kindWords.ts';
import type { BreakerPart, FusePart } from '../job/part.ts';
import { given, type List, type ListInput, worstCurrent } from './list.ts';

const headings = [
  'Id',
  'Label',
  'Kind',
  'Type',
  'Rating (A)',
  'Rated volts (V DC)',
  'Interrupts (A)',
  'Place',
  'From',
  'To',
  'Protects',
  'Carries at most (A)',
  'In case',
];

export function fuseList({ job, points }: ListInput): List {
  const devices = job.parts.filter((part): part is FusePart | BreakerPart => {
    return part.kind === 'fuse' || part.kind === 'breaker';
  });
  const cablesOf = protectedBy(job.parts);
  const rows = devices.map((device): readonly string[] => {
    const worst = worstCurrent(points, device.id);
    return [
      device.id,
      device.label ?? '',
      KIND_WORDS[device.kind],
      device.type ?? '',
      given(device.ratingA),
      given(device.ratingV),
      given(device.interruptA),
      device.locationTag ?? '',
      device.from,
      device.to,
      cablesOf(device)
        .map(({ id }) => id)
        .join('; '),
      worst.currentA,
      worst.case,
    ];
  });
  return { headings, rows };
}
