/** Banks of two or more branches side by side, as the rules about strings see them in a case. */
import { stringSource } from '../battery/stringSource.ts';
import type { PartId, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { closedNets } from '../network/wiring.ts';
import { type Bank, type Branch, banksOf } from '../strings/banks.ts';
import { branchCurrent } from '../strings/sharing/bankCurrents.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { list, titleOf } from './wording.ts';

const ofCase = new WeakMap<SolvedCase, readonly Bank[]>();

/** The banks of a case in which two or more branches stand side by side between two different poles. */
export function sharedBanks(one: SolvedCase): readonly Bank[] {
  let banks = ofCase.get(one);
  if (banks === undefined) {
    const nets = closedNets(one.parts);
    banks = banksOf(one.parts).filter(
      ({ branches: [first, second] }) => second !== undefined && !nets.same(first!.plus, first!.minus),
    );
    ofCase.set(one, banks);
  }
  return banks;
}

/** Current out of each branch, in their order; `undefined` where the network does not determine one. */
export function branchCurrents({ point }: SolvedCase, bank: Bank): readonly number[] | undefined {
  const currents = bank.branches.map((branch) => branchCurrent(point, branch));
  return currents.every((currentA) => currentA !== null) ? currents : undefined;
}

/** A branch as one source: volts at rest, resistance of its strings and their links, nominal volts. */
interface BranchSource {
  readonly emfV: number;
  readonly ohm: number;
  readonly nominalV: number;
}

export function branchSource(
  context: CheckContext,
  branch: Branch,
  { model, ambientDegC }: { readonly model: 'slow' | 'fast'; readonly ambientDegC: number },
): BranchSource {
  const tables = context.tables.chemistry;
  let [emfV, ohm, nominalV] = [0, 0, 0];
  for (const string of branch.strings) {
    const source = stringSource(string, { model, ambientDegC, tables });
    emfV += source.emfV.value;
    ohm += source.resistanceOhm.value + string.linkOhm;
    nominalV += string.blocksInSeries * string.blockNominalV;
  }
  return { emfV, ohm, nominalV };
}

export function idsOf({ strings }: { readonly strings: readonly StringPart[] }): readonly PartId[] {
  return strings.map(({ id }) => id);
}

/** `String A (left)`, or `Strings A and B in series`, to begin a sentence. */
export function branchTitle({ strings }: Branch): string {
  const [first, ...others] = strings;
  return others.length === 0 ? titleOf(first!) : `Strings ${list(strings.map(nameOf))} in series`;
}

/** `A`, or `A + B`, in the run of a sentence. */
export function branchName({ strings }: Branch): string {
  return idsOf({ strings }).join(' + ');
}
