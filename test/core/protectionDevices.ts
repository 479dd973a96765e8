/** Fuses, breakers and cables for tests, read by the real reader. */
import type { BreakerPart, CablePart, FusePart } from '../../core/job/part.ts';
import type { DeviceBand } from '../../core/protection/answer.ts';
import { deviceBandOf } from '../../core/protection/deviceBand.ts';
import { tables } from '../../data/index.ts';
import { jobOf } from './checksJob.ts';

type Fields = Readonly<Record<string, unknown>>;

export function fuse(ratingA: number, type: string | undefined, fields: Fields = {}): FusePart {
  const [part] = jobOf({
    parts: [{ id: 'F', kind: 'fuse', from: 'A', to: 'B', ratingA, ...typed(type), ...fields }],
  }).parts;
  if (part?.kind !== 'fuse') throw new Error('a fuse was read');
  return part;
}

export function breaker(ratingA: number, type: string | undefined, fields: Fields = {}): BreakerPart {
  const [part] = jobOf({
    parts: [{ id: 'B', kind: 'breaker', from: 'A', to: 'B', ratingA, ...typed(type), ...fields }],
  }).parts;
  if (part?.kind !== 'breaker') throw new Error('a breaker was read');
  return part;
}

export function cable(size: string, fields: Fields = {}): CablePart {
  const [part] = jobOf({ parts: [{ id: 'C', kind: 'cable', from: 'A', to: 'B', lengthM: 1, size, ...fields }] }).parts;
  if (part?.kind !== 'cable') throw new Error('a cable was read');
  return part;
}

export function bandOf(device: FusePart | BreakerPart): DeviceBand {
  const band = deviceBandOf(device, tables);
  if ('missing' in band) throw new Error(`a band is known: ${band.missing}`);
  return band;
}

function typed(type: string | undefined): Fields {
  return type === undefined ? {} : { type };
}
