/** What eats the volts on a volt walk, by kind of part: the sentence over the chart. */
import type { CheckedJob } from '../job/job.ts';
import type { PartId, PartKind } from '../job/part.ts';
import type { VoltWalk } from './walk.ts';

export type LossGroup = 'cables' | 'joints' | 'busbars' | 'fuses and switches' | 'diodes' | 'battery';

export interface WalkLoss {
  readonly group: LossGroup;
  /** Out and back together; positive where volts are lost. */
  readonly lostV: number;
}

/** What the sources of the walk give together, at rest volts: the sum of their rises. */
export function walkRiseV({ steps }: VoltWalk): number {
  return steps.reduce((sum, { kind, changeV }) => (kind === 'source' ? sum + changeV : sum), 0);
}

/** Losses of the wiring and inside strings, largest first; groups that lose nothing are left out. */
export function walkLosses(walk: VoltWalk, job: CheckedJob): readonly WalkLoss[] {
  const kindOf = new Map<PartId, PartKind>(job.parts.map(({ id, kind }) => [id, kind]));
  const lost = new Map<LossGroup, number>();
  for (const { kind, part, changeV } of walk.steps) {
    if (kind !== 'part' && kind !== 'sag') continue;
    const group = kind === 'sag' ? 'battery' : groupOf(kindOf.get(part) ?? kindOf.get(ownerOf(part)));
    lost.set(group, (lost.get(group) ?? 0) - changeV);
  }
  const losses = [...lost].map(([group, lostV]) => ({ group, lostV })).filter(({ lostV }) => lostV > 0);
  losses.sort((a, b) => b.lostV - a.lostV);
  return losses;
}

/** The run that a cable of it belongs to. */
function ownerOf(cable: PartId): PartId {
  return cable.replace(/\.(?:plus|minus)$/, '') as PartId;
}

function groupOf(kind: PartKind | undefined): LossGroup {
  switch (kind) {
    case 'joint':
      return 'joints';
    case 'busbar':
      return 'busbars';
    case 'fuse':
    case 'breaker':
    case 'switch':
    case 'shunt':
      return 'fuses and switches';
    case 'diode':
      return 'diodes';
    case 'string':
      return 'battery';
    default:
      return 'cables';
  }
}
