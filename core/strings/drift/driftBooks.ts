/** What went out of each store and into it, and whether that adds up. */
import type { DriftedString, DriftStudy } from '../answer.ts';
import type { Bank } from '../banks.ts';
import type { Step, Store, StoreStep } from './driftNetwork.ts';

const SECONDS_AN_HOUR = 3600;

class Account {
  givenAs = 0;
  takenAs = 0;
  gassedAs = 0;
  largestA = 0;
  lowest: number;
  highest: number;
  readonly start: number;
  end: number;

  constructor(start: number) {
    this.start = start;
    this.end = start;
    this.lowest = start;
    this.highest = start;
  }

  enter({ currentA, stateOfCharge, gassedAs }: StoreStep, seconds: number): void {
    if (currentA > 0) this.givenAs += currentA * seconds;
    else this.takenAs -= currentA * seconds;
    this.gassedAs += gassedAs;
    this.largestA = Math.max(this.largestA, currentA);
    this.end = stateOfCharge;
    this.lowest = Math.min(this.lowest, stateOfCharge);
    this.highest = Math.max(this.highest, stateOfCharge);
  }
}

/**
 * The books of a run. Charge: what a store holds more at the end is what it took, less what was not kept and what it gave. Energy:
 * what it holds more, plus heat and gas, is what passed its terminals, by the volts of the network; and in every step all parts
 * of the network together take nothing (Tellegen).
 */
export class DriftBooks {
  private readonly stores: readonly Store[];
  private readonly accounts: readonly Account[];
  private readonly energyJ = { passed: 0, missing: 0, heat: 0, gas: 0, imbalance: 0 };

  constructor(stores: readonly Store[], start: ArrayLike<number>) {
    this.stores = stores;
    this.accounts = stores.map((_, k) => new Account(start[k]!));
  }

  /** One step; `storedJ` is what each store holds more at its end, by its own curve. */
  enter(step: Step, seconds: number, storedJ: readonly number[]): void {
    const { energyJ } = this;
    step.stores.forEach((store, k) => {
      this.accounts[k]!.enter(store, seconds);
      const outJ = store.terminalV * store.currentA * seconds;
      energyJ.passed += Math.abs(outJ);
      energyJ.heat += store.heatJ;
      energyJ.gas += store.gassedJ;
      energyJ.missing += storedJ[k]! + store.heatJ + store.gassedJ + outJ;
    });
    energyJ.imbalance += Math.abs(step.imbalanceJ);
  }

  get books(): DriftStudy['books'] {
    const { passed, missing, heat, gas, imbalance } = this.energyJ;
    let throughputAs = 0;
    let mismatchAs = 0;
    this.accounts.forEach((account, k) => {
      const { givenAs, takenAs, gassedAs, start, end } = account;
      throughputAs += givenAs + takenAs;
      const heldAs = (end - start) * this.stores[k]!.string.capacityAh * SECONDS_AN_HOUR;
      mismatchAs = Math.max(mismatchAs, Math.abs(heldAs - (takenAs - gassedAs - givenAs)));
    });
    return {
      throughputAh: throughputAs / SECONDS_AN_HOUR,
      mismatchAh: mismatchAs / SECONDS_AN_HOUR,
      throughputWh: passed / SECONDS_AN_HOUR,
      mismatchWh: (Math.abs(missing) + imbalance) / SECONDS_AN_HOUR,
      lostWh: heat / SECONDS_AN_HOUR,
      gassedWh: gas / SECONDS_AN_HOUR,
    };
  }

  /** What became of each store; its share is of what its bank gave. Charge is shown between empty and full. */
  strings(banks: readonly Bank[]): readonly DriftedString[] {
    const givenAs = new Map(this.stores.map(({ string }, k) => [string.id, this.accounts[k]!.givenAs]));
    return this.stores.map(({ string, half }, k) => {
      const account = this.accounts[k]!;
      const bank = banks.find(({ strings }) => strings.some(({ id }) => id === string.id));
      // Strings in series in a branch pass the same charge on: the branch gives it once.
      const bankAs = (bank?.branches ?? []).reduce(
        (sum, branch) =>
          sum + branch.strings.reduce((own, { id }) => own + givenAs.get(id)!, 0) / branch.strings.length,
        0,
      );
      return {
        id: string.id,
        half,
        givenAh: shownAh(account.givenAs),
        takenAh: shownAh(account.takenAs),
        gassedAh: shownAh(account.gassedAs),
        share: shownAh(bankAs) > 0 ? account.givenAs / bankAs : null,
        lowestCharge: shownCharge(account.lowest),
        highestCharge: shownCharge(account.highest),
        endCharge: shownCharge(account.end),
        largestA: account.largestA > NO_CURRENT_A ? account.largestA : 0,
      };
    });
  }
}

/** What solving leaves of no current: less than this. */
const NO_CURRENT_A = 1e-9;
/** What months of no current leave of no charge. */
const NO_CHARGE_AH = 1e-6;

function shownAh(chargeAs: number): number {
  const chargeAh = chargeAs / SECONDS_AN_HOUR;
  return chargeAh > NO_CHARGE_AH ? chargeAh : 0;
}

/** Between empty and full: a run may go a little beyond either where volts run off. */
export function shownCharge(stateOfCharge: number): number {
  return Math.min(1, Math.max(0, stateOfCharge));
}
