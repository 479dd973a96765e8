/** Nets fed over two fuses at once: opening one of them isolates nothing. */
import type { Device, Nets, SinglePart } from '../network/wiring.ts';
import { isDevice, isOpen, netsOf } from '../network/wiring.ts';
import { COMMON_PRACTICE } from './bases.ts';
import type { SolvedCase } from './checkContext.ts';
import type { Rule } from './rule.ts';
import { GroupVerdicts, PASS } from './tally.ts';
import { list } from './wording.ts';

export const ringFeed: Rule = {
  id: 'ring-feed',
  family: 'wiring',
  kinds: ['fuse', 'breaker'],
  title: 'Fuses that stand in a ring',
  compares: 'closed fuses and breakers, case by case: does another fused way join the two sides of one',
  remedy: 'Break the ring, or label both feeding points, and check each leg alone.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => COMMON_PRACTICE,
  run: (context) => {
    const verdicts = new GroupVerdicts();
    const known = new Set<string>();
    for (const one of context.cases) {
      // Cases with the same parts open have the same rings.
      const key = one.parts.flatMap((part) => (isOpen(part) ? [part.id] : [])).join(' ');
      if (known.has(key)) continue;
      known.add(key);
      const rings = ringsOf(one.parts);
      for (const ring of rings)
        verdicts.add(
          ring.map(({ id }) => id),
          ringFailure(one, ring),
        );
      const inRing = new Set(rings.flat());
      for (const part of one.parts)
        if (isDevice(part) && !isOpen(part) && !inRing.has(part)) verdicts.add([part.id], PASS);
    }
    return verdicts.outcome(ringFeed, COMMON_PRACTICE);
  },
};

function ringFailure(one: SolvedCase, ring: readonly Device[]) {
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: ring.length, unit: '1' },
    limit: { value: 1, unit: '1' },
    excess: ring.length,
    message: `${list(ring.map(({ id }) => id))} stand in a ring: what lies between them is fed from both sides, so opening one of them isolates nothing.`,
  } as const;
}

/** Closed devices both sides of which stay joined without them, those of one ring together. */
function ringsOf(parts: readonly SinglePart[]): readonly (readonly Device[])[] {
  const nets = netsOf(parts, (part) => !isOpen(part) && !isDevice(part) && part.kind !== 'diode');
  const between = withoutTwigs(
    parts.filter((part): part is Device => isDevice(part) && !isOpen(part) && !nets.same(part.from, part.to)),
    nets,
  );
  const rings = new Map<number, Device[]>();
  const inRing = between.filter((device) => joinedWithout(device, between, nets));
  for (const device of inRing) {
    const root = Math.min(...reachedFrom(nets.of(device.from)!, inRing, nets));
    rings.set(root, [...(rings.get(root) ?? []), device]);
  }
  return [...rings.values()];
}

/** Devices that are left when those that lead to a dead end are taken away, again and again. */
function withoutTwigs(devices: readonly Device[], nets: Nets): readonly Device[] {
  let left = devices;
  for (;;) {
    const degree = new Map<number, number>();
    for (const { from, to } of left) {
      for (const net of [nets.of(from)!, nets.of(to)!]) degree.set(net, (degree.get(net) ?? 0) + 1);
    }
    const kept = left.filter(({ from, to }) => degree.get(nets.of(from)!)! > 1 && degree.get(nets.of(to)!)! > 1);
    if (kept.length === left.length) return kept;
    left = kept;
  }
}

function joinedWithout(device: Device, devices: readonly Device[], nets: Nets): boolean {
  const others = devices.filter((other) => other !== device);
  return reachedFrom(nets.of(device.from)!, others, nets).has(nets.of(device.to)!);
}

function reachedFrom(start: number, devices: readonly Device[], nets: Nets): ReadonlySet<number> {
  const around = new Map<number, number[]>();
  const add = (from: number, to: number) => around.set(from, [...(around.get(from) ?? []), to]);
  for (const { from, to } of devices) {
    add(nets.of(from)!, nets.of(to)!);
    add(nets.of(to)!, nets.of(from)!);
  }
  const reached = new Set([start]);
  for (const net of reached) for (const next of around.get(net) ?? []) reached.add(next);
  return reached;
}
