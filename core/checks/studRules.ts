/** What stands on studs and posts: too many rings, clips that rely on a spring, live metal without a cover. */
import type { BusbarPart, JointPart, StringPart } from '../job/part.ts';
import type { Device, SinglePart } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { deviceGraphOf } from './deviceGraph.ts';
import { askOnce, fact, isAsked } from './flags.ts';
import { isEarthed } from './livePoles.ts';
import type { Rule } from './rule.ts';
import { isOver, PASS, Tally } from './tally.ts';
import { shortList, titleOf, withEdition } from './wording.ts';

export const studCrowded: Rule = {
  id: 'stud-crowded',
  family: 'wiring',
  kinds: ['cable'],
  title: 'Too many ring terminals on one stud',
  compares: 'number of cable ends at each junction that is no place of a busbar with the most that a stud takes',
  remedy: 'Use a busbar; on a stud the largest lug lies nearest to its base.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.ringTerminals.basis, judge),
  run: (context) => {
    const tally = new Tally(studCrowded, studCrowded.basisFor(context));
    const most = context.practice.ringTerminals.value;
    for (const [junction, ends] of context.meetings) {
      if (ends.some(({ part }) => part.kind === 'busbar')) continue;
      const cables = ends.flatMap(({ part }) => (part.kind === 'cable' ? [part] : []));
      const rings = cables.reduce((sum, { inParallel }) => sum + inParallel, 0);
      const ids = [...new Set(cables.map(({ id }) => id))];
      if (rings < 2) continue;
      tally.judge(ids, [
        isOver(rings, most)
          ? {
              kind: 'fail',
              severity: 'look',
              case: context.cases[0]?.id ?? '',
              measured: { value: rings, unit: '1' },
              limit: { value: most, unit: '1' },
              excess: rings / most,
              message: `Junction ${junction} has ${String(rings)} cable ends (${shortList(ids)}); a stud takes ${String(most)}.`,
            }
          : PASS,
      ]);
    }
    return tally.outcome();
  },
};

export const springClips: Rule = {
  id: 'spring-or-crocodile-clip',
  family: 'battery',
  kinds: ['string', 'joint'],
  title: 'Battery held by clips that rely on a spring',
  compares: 'springClip of each string and joint: is it bolted',
  remedy: 'Use bolted ring terminals.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('spring-or-crocodile-clip', judge),
  run: (context) => {
    const tally = new Tally(springClips, springClips.basisFor(context));
    const held = context.drawn.filter((part) => part.kind === 'string' || part.kind === 'joint') as readonly (
      | StringPart
      | JointPart
    )[];
    for (const part of held) {
      if (part.springClip === undefined) continue;
      const message = `${titleOf(part)} is held by a clip that relies on a spring: it works loose, heats and sparks.`;
      tally.judge([part.id], [part.springClip ? fact(context, 'fix', message) : PASS]);
    }
    const unsaid = held.filter(({ kind, springClip }) => kind === 'string' && springClip === undefined);
    if (isAsked(context, 'spring-or-crocodile-clip')) askOnce(tally, unsaid, 'springClip');
    return tally.outcome();
  },
};

export const bareLiveStud: Rule = {
  id: 'bare-live-stud',
  family: 'battery',
  kinds: ['string'],
  title: 'Live stud without a cover, before the first fuse',
  compares:
    'covered of each string, and of each bar, joint, fuse and breaker that no fuse parts from the live pole of a string',
  remedy: 'Fit a boot, cap or cover.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('bare-live-stud', judge),
  run: (context) => {
    const tally = new Tally(bareLiveStud, bareLiveStud.basisFor(context));
    const studs = liveStuds(context);
    for (const part of studs) {
      if (part.covered === undefined) continue;
      const message = `${titleOf(part)} has live metal that nothing covers, with no fuse before it: a dropped spanner draws the full current of the battery.`;
      tally.judge([part.id], [part.covered ? PASS : fact(context, 'fix', message)]);
    }
    const unsaid = studs.filter(({ covered }) => covered === undefined);
    if (isAsked(context, 'bare-live-stud')) askOnce(tally, unsaid, 'covered');
    return tally.outcome();
  },
};

type Stud = StringPart | BusbarPart | JointPart | Device;

function liveStuds(context: CheckContext): readonly Stud[] {
  const { bare } = deviceGraphOf(context);
  const live = new Set<number>();
  for (const part of context.drawn) {
    if (part.kind !== 'string') continue;
    // The earthed pole is not live; where none is earthed the minus is the common return, as usual in this trade.
    const isPlusEarthed = isEarthed(context, part.plus) && !isEarthed(context, part.minus);
    live.add(bare.of(isPlusEarthed ? part.minus : part.plus)!);
  }
  const isLive = (part: SinglePart): part is Stud => {
    if (part.kind === 'string') return true;
    if (part.kind === 'busbar') return part.junctions.some((junction) => live.has(bare.of(junction)!));
    if (part.kind !== 'joint' && part.kind !== 'fuse' && part.kind !== 'breaker') return false;
    return live.has(bare.of(part.from)!) || live.has(bare.of(part.to)!);
  };
  return context.drawn.filter(isLive);
}
