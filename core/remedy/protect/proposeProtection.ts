/** Proposes a device and a cable size for every conductor run of a job, cheapest first; never applied by itself. */
import type { Finding } from '../../checks/finding.ts';
import { rules } from '../../checks/rules.ts';
import { runRules } from '../../checks/runChecks.ts';
import type { PartId } from '../../job/part.ts';
import { identityOf } from '../identity.ts';
import { classifyDevices, faultsOf } from './deviceClass.ts';
import { lessDrop } from './lessDrop.ts';
import { newDevices } from './newDevices.ts';
import { Plan } from './plan.ts';
import type { ProtectionProposal, ProtectionRequest } from './proposal.ts';
import { rateDevices } from './rateDevices.ts';
import { proposalOf } from './runProposals.ts';
import { sizeCables, sizeReturns } from './sizeCables.ts';
import { standLetThrough, weakFaults } from './weakFaults.ts';

/** Rules that fuses, breakers and cable sizes answer: no proposal may bring a finding of theirs. */
export const PROTECTION_RULES: ReadonlySet<string> = new Set([
  'no-fuse-on-source',
  'string-unfused',
  'charger-end-open',
  'cable-shrinks',
  'fuse-too-far',
  'fuse-over-cable',
  'small-wire-cap',
  'fuse-over-device-limit',
  'fuse-under-current',
  'fuse-under-continuous',
  'cable-overloaded',
  'cable-under-continuous',
  'cable-too-thin',
  'return-smaller',
  'drop-too-big',
  'interrupt-too-low',
  'big-bank-needs-more',
  'fault-too-weak',
  'cable-cooks',
]);

/** Thicker cables change what flows, so that all is looked at anew. */
const MOST_ROUNDS = 3;
/** Times that the search is begun anew with parts left alone whose change brought a finding. */
const MOST_STARTS = 4;

/**
 * For every run: what stands is kept where it passes the rules of the job's practice; else the cheapest change does, by metres times
 * square millimetres of copper plus devices (`core/remedy/protect/cost.ts`). Cables are sized for what flows and for the drop first;
 * then a fuse is put where nothing protects a conductor; then each device gets the next standard rating at or above its current with
 * margin, and where that is more than a cable admits, the cable grows or the branch gets a fuse of its own.
 *
 * All changes together are judged anew on a copy: they bring no finding of the rules of protection. What they do not solve stands in
 * `left`. A job that names no practice, or of which no case can be solved, gets no proposals.
 */
export function proposeProtection(request: ProtectionRequest): ProtectionProposal {
  const before = new Plan(request);
  const was = findingsOf(before);
  const frozen = new Set<PartId>();
  for (let start = 0; start < MOST_STARTS; start += 1) {
    const plan = new Plan({ ...request, points: before.context.cases.map(({ point }) => point), frozen });
    for (const rejected of before.rejected) plan.reject(rejected);
    if (isJudged(plan)) search(plan, within(request.progress, start));
    const is = findingsOf(plan);
    const arisen = arisenOf(was, is);
    if (arisen.length === 0) {
      const proposal = proposalOf({ plan, was, is, faults: faultsOf(plan) });
      request.progress?.(100, 100);
      return proposal;
    }
    for (const id of touchedBy(plan, arisen)) {
      frozen.add(id);
      const why = `it would bring: ${arisen.map(({ message }) => message).join(' ')}`;
      before.reject({ part: id, words: 'What its figures ask for', why });
    }
  }
  const proposal = proposalOf({ plan: before, was, is: was, faults: faultsOf(before) });
  request.progress?.(100, 100);
  return proposal;
}

function isJudged({ job, context }: Plan): boolean {
  return job.practiceAssumed !== true && context.steady.length > 0;
}

function within(progress: ProtectionRequest['progress'], start: number): (round: number, step: number) => void {
  const span = 90 / MOST_STARTS;
  return (round, step) => progress?.(Math.round(5 + span * (start + (round + step / STEPS.length) / MOST_ROUNDS)), 100);
}

const STEPS: readonly ((plan: Plan) => void)[] = [
  sizeCables,
  sizeReturns,
  lessDrop,
  newDevices,
  rateDevices,
  weakFaults,
  standLetThrough,
  classifyDevices,
];

function search(plan: Plan, progress: (round: number, step: number) => void): void {
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const { draft } = plan;
    STEPS.forEach((step, k) => {
      step(plan);
      progress(round, k + 1);
    });
    if (plan.draft === draft) return;
  }
}

function findingsOf({ context }: Plan): readonly Finding[] {
  return runRules(
    context,
    rules.filter(({ id }) => PROTECTION_RULES.has(id)),
  ).findings;
}

function arisenOf(was: readonly Finding[], is: readonly Finding[]): readonly Finding[] {
  const known = new Set(was.map(identityOf));
  return is.filter((finding) => !known.has(identityOf(finding)));
}

/** Parts whose change may have brought the findings; all that was changed where none of them is named. */
function touchedBy(plan: Plan, arisen: readonly Finding[]): readonly PartId[] {
  const named = new Set(arisen.flatMap(({ parts }) => parts));
  const isNamed = (id: PartId) =>
    named.has(id) || named.has(`${id}.plus` as PartId) || named.has(`${id}.minus` as PartId);
  const sizes = [...plan.sizes.values()].map(({ conductor }) => conductor.part);
  const changed = [...sizes, ...plan.ratings.keys(), ...plan.fresh.map(({ near }) => near)];
  const fresh = plan.fresh.filter(({ device, near }) => isNamed(device) || isNamed(near)).map(({ near }) => near);
  const blamed = [...[...sizes, ...plan.ratings.keys()].filter(isNamed), ...fresh];
  return blamed.length === 0 ? changed : blamed;
}
