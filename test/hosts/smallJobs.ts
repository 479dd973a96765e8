/** Small invented jobs for the hosts' tests, each with an answer that can be said beforehand. */

const bank = {
  id: 'S1',
  kind: 'string',
  plus: 'B+',
  minus: 'B-',
  chemistry: 'agm',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 100,
  emfV: 12.6,
  resistanceOhm: '10 mOhm',
};

function job(parts: readonly unknown[], rest: Record<string, unknown> = {}): Record<string, unknown> {
  return { format: 'ohmwright-job', version: 1, title: 'Invented test job', practice: 'iec-land', parts, ...rest };
}

/** 12.6 V behind 10 mΩ feeds 1.25 Ω: 12.6 V / 1.26 Ω = 10 A, 12.5 V at the load. */
export const tenAmps = job([bank, { id: 'L1', kind: 'load', plus: 'B+', minus: 'B-', resistanceOhm: 1.25 }], {
  cases: [{ id: 'on' }, { id: 'off', set: { L1: { on: false } } }],
});

/** The most that 12.6 V behind 10 mΩ can deliver is 12.6² / (4 · 0.01) = 3969 W, so 5 kW finds no operating point. */
export const tooMuch = job([bank, { id: 'L1', kind: 'load', plus: 'B+', minus: 'B-', powerW: '5 kW' }]);

/** A thin cable with a fuse far above what it can carry. */
export const thinCable = job([
  bank,
  { id: 'F1', kind: 'fuse', from: 'B+', to: 'F+', ratingA: 300, ratingV: 32, interruptA: 20_000 },
  { id: 'C1', kind: 'cable', from: 'F+', to: 'L+', lengthM: 5, size: '1.5 mm2', run: 'conduit', insulationDegC: 70 },
  { id: 'C2', kind: 'cable', from: 'L-', to: 'B-', lengthM: 5, size: '1.5 mm2', run: 'conduit', insulationDegC: 70 },
  { id: 'L1', kind: 'load', plus: 'L+', minus: 'L-', currentA: 30 },
]);

/** Two slips: a length in kilograms and a size without its system. */
export const twoSlips = job([bank, { id: 'C1', kind: 'cable', from: 'B+', to: 'a', lengthM: '5 kg', size: 35 }]);
