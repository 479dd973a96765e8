/** Banks, chargers, solar harvest and converters of random jobs. */
import { addPoint, type Draft, type Root, type SupplyPoint } from './jobDraft.ts';
import { addBar, addChain, addDiode, given } from './randomConductors.ts';

/** A bank of strings in parallel and the point where its loads start. */
export function addBank(draft: Draft, bank: { readonly strings: number; readonly nominalV: number }): SupplyPoint {
  const { random } = draft;
  const { strings, nominalV } = bank;
  const plusBar = addBar(draft, strings + 1);
  const minusBar = addBar(draft, strings + 1);
  let conductance = 0;
  for (let k = 0; k < strings; k++) {
    const plus = addChain(draft, { from: plusBar[k] ?? plusBar[0]!, count: random.whole([0, 2]) });
    const minus = addChain(draft, { from: minusBar[k] ?? minusBar[0]!, count: random.whole([0, 1]) });
    const stringOhm = addString(draft, { plus: plus.to, minus: minus.to, nominalV });
    conductance += 1 / (stringOhm + plus.ohm + minus.ohm);
  }
  const root: Root = { nominalV, budgetA: 60 + 40 * strings, points: [] };
  return addPoint({
    plus: plusBar.at(-1)!,
    minus: minusBar.at(-1)!,
    parent: undefined,
    pathOhm: 1 / conductance,
    lossV: 0,
    root,
  });
}

function addString(
  draft: Draft,
  string: { readonly plus: string; readonly minus: string; readonly nominalV: number },
): number {
  const { random } = draft;
  const { nominalV, plus, minus } = string;
  const resistanceOhm = (nominalV / 12) * random.logBetween([2e-3, 3e-2]);
  const linkOhm = random.chance(0.3) ? random.logBetween([1e-4, 1e-3]) : undefined;
  const midpoint = random.chance(0.2) ? draft.newJunction() : undefined;
  draft.add('string', {
    plus,
    minus,
    chemistry: random.pick(['flooded', 'agm', 'gel']),
    blocksInSeries: nominalV / 6,
    blockNominalV: 6,
    capacityAh: random.pick([100, 200, 400]),
    emfV: nominalV * random.between([1.03, 1.06]),
    resistanceOhm,
    ...given({ linkOhm, midpoint }),
  });
  if (midpoint !== undefined && random.chance(0.5)) {
    // A small load fed from half a string, which unbalances the halves.
    const [high, low] = random.chance(0.5) ? [plus, midpoint] : [midpoint, minus];
    draft.add('load', { plus: high, minus: low, currentA: random.between([0.1, 2]) });
  }
  return resistanceOhm + (linkOhm ?? 0);
}

/** A charger through its own leads: some below their set point, some above, some switched off. */
export function addCharger(draft: Draft, point: SupplyPoint): void {
  const { random } = draft;
  const plus = addChain(draft, { from: point.plus, count: random.whole([0, 2]) }).to;
  const minus = addChain(draft, { from: point.minus, count: random.whole([0, 1]) }).to;
  draft.add('charger', {
    plus,
    minus,
    outputA: random.between([2, 40]),
    setpointV: point.root.nominalV * random.between([0.95, 1.25]),
    source: random.pick(['shore', 'generator', 'alternator']),
    ...(random.chance(0.15) ? { on: false } : {}),
  });
}

/** A charger as the only source of an island; its loads must stay below what it can give. */
export function addChargerIsland(draft: Draft, nominalV: number): SupplyPoint {
  const { random } = draft;
  const plus = draft.newJunction();
  const minus = draft.newJunction();
  const outputA = random.between([10, 40]);
  draft.add('charger', { plus, minus, outputA, setpointV: nominalV * random.between([1, 1.2]) });
  const root: Root = { nominalV, budgetA: 0.5 * outputA, points: [] };
  return addPoint({ plus, minus, parent: undefined, pathOhm: 0, lossV: 0, root });
}

/** Arrays and their controller: the array side meets the rest at the controller's minus, or not at all. */
export function addHarvest(draft: Draft, point: SupplyPoint): void {
  const { random } = draft;
  const type = random.pick(['mppt', 'pwm']);
  const { nominalV } = point.root;
  const modulesInSeries = nominalV / 12 + (type === 'mppt' ? random.whole([1, 2]) : 0);
  const inputMinus = random.chance(0.6) ? point.minus : draft.newJunction();
  const inputPlus = draft.newJunction();
  const outputPlus = addChain(draft, { from: point.plus, count: random.whole([0, 2]) }).to;
  const module = randomModule(draft);
  for (let array = random.whole([1, 2]); array > 0; array--) {
    const plus = addChain(draft, { from: inputPlus, count: random.whole([0, 2]) }).to;
    const behind = random.chance(0.25) ? draft.newJunction() : plus;
    if (behind !== plus) addDiode(draft, { from: behind, to: plus });
    const minus = addChain(draft, { from: inputMinus, count: random.whole([0, 1]) }).to;
    draft.add('array', { plus: behind, minus, modulesInSeries, stringsInParallel: random.whole([1, 3]), ...module });
  }
  draft.add('controller', {
    from: { plus: inputPlus, minus: inputMinus },
    to: { plus: outputPlus, minus: point.minus },
    type,
    outputA: random.between([2, 40]),
    maxInputV: 250,
    setpointV: nominalV * random.between([0.98, 1.25]),
    ...(random.chance(0.5) ? { efficiency: random.between([0.9, 0.98]) } : {}),
  });
}

/** An invented 36-cell module. */
function randomModule(draft: Draft): Record<string, unknown> {
  const { random } = draft;
  const vocV = random.between([21, 23]);
  const iscA = random.between([3, 10]);
  return {
    vocV,
    iscA,
    vmpV: vocV * random.between([0.78, 0.83]),
    impA: iscA * random.between([0.92, 0.95]),
    vocPerDegC: -0.0031,
    iscPerDegC: 0.0005,
    pmpPerDegC: -0.0043,
    nominalCellDegC: 45,
  };
}

/** A converter and the point that it feeds: nothing but its own loads, or a small second bank. */
export function addConverter(
  draft: Draft,
  feed: { readonly point: SupplyPoint; readonly inputA: number },
): SupplyPoint {
  const { random } = draft;
  const { point, inputA } = feed;
  const outputNominalV = random.pick([12, 24]);
  const deliverableA = (0.7 * inputA * point.root.nominalV) / outputNominalV;
  const bank = random.chance(0.3) ? addBank(draft, { strings: 1, nominalV: outputNominalV }) : undefined;
  const plus = bank?.plus ?? draft.newJunction();
  const minus = bank?.minus ?? (random.chance(0.6) ? point.minus : draft.newJunction());
  draft.add('converter', {
    from: { plus: point.plus, minus: point.minus },
    to: { plus, minus },
    outputV: outputNominalV * random.between([1, 1.15]),
    // Before a bank the limit itself keeps the input within what was booked.
    outputA: bank === undefined ? 1.5 * deliverableA : 0.8 * deliverableA,
    ...(random.chance(0.5) ? { efficiency: random.between([0.85, 0.97]) } : {}),
    ...(random.chance(0.5) ? { standbyW: random.between([0.2, 2]) } : {}),
  });
  if (bank !== undefined) return bank;
  const root: Root = { nominalV: outputNominalV, budgetA: 0.8 * deliverableA, points: [] };
  return addPoint({ plus, minus, parent: undefined, pathOhm: 0, lossV: 0, root });
}
