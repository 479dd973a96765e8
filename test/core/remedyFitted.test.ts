/** Remedies of what is fitted where parts stand: each is tried on the job, and the finding is then gone. */
import { expect, test } from 'vitest';
import { applyEdit, draftOf, remedyTrials, runChecks } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { oneCircuit, type RawJob } from './checksJob.ts';

const lead = { chemistry: 'flooded', blockNominalV: 12, capacityAh: 400, emfV: 12.7, enclosure: 'box' };
const { parts, ...rest } = oneCircuit({});
const withSwitch: RawJob = {
  ...rest,
  parts: [
    ...parts.map((part) => (part.id === 'OUT' ? { ...part, from: 'Q2' } : part)),
    { id: 'SW', kind: 'switch', from: 'Q', to: 'Q2', ratingA: 100 },
  ],
};
const hot = oneCircuit({
  practice: 'us-marine',
  cable: { size: '10 AWG', insulationDegC: 105, resistanceOhm: undefined },
  fuse: { terminalDegC: 75 },
  load: { currentA: 50, terminalDegC: 75 },
});

test.each<readonly [rule: string, job: RawJob, label: RegExp]>([
  ['battery-loose', oneCircuit({ battery: { heldDown: false } }), /strapped down/],
  ['spring-or-crocodile-clip', oneCircuit({ battery: { springClip: true } }), /bolted/],
  ['bare-live-stud', oneCircuit({ battery: { covered: false } }), /its live metal covered/],
  // Six cells: 0.05 x 6 x 20 x 400 / 1000 = 2.4 m3/h, 67.2 cm2.
  ['gas-no-vent', oneCircuit({ battery: { ...lead, ventOpeningCm2: 20 } }), /68 cm² each/],
  ['gas-no-vent', oneCircuit({ battery: { ...lead, ventAirM3PerH: 1 } }), /a fan of 2.4 m³\/h/],
  [
    'spark-near-gas',
    oneCircuit({ battery: lead, fuse: { inBatterySpace: true, ignitionProtected: false } }),
    /ignition-protected/,
  ],
  ['main-switch-small', withSwitch, /Switch SW: 200 A instead of 100 A/],
  ['terminal-too-cool', hot, /Cable OUT|Cable BACK/],
])('%s goes by: %#', (rule, raw, label) => {
  const job = { format: 'ohmwright-job', version: 1, title: 'a job for a test', practice: 'iec-land', ...raw };
  const opened = draftOf(JSON.stringify(job));
  if (!opened.ok) throw new Error(JSON.stringify(opened.issues));
  const { draft, job: checked } = opened.value;
  const report = runChecks({ job: checked, tables });
  const finding = report.findings.find((one) => one.rule === rule);
  if (finding === undefined) throw new Error(`no finding of ${rule}`);
  const trials = remedyTrials({ draft, job: checked, tables, finding, report });
  expect(trials.map((one) => one.label).join('; ')).toMatch(label);
  const trial = trials.find((one) => label.test(one.label))!;
  expect(trial.stillThere).toBe(false);
  const edited = applyEdit(draft, trial.edit, tables);
  if (!edited.ok) throw new Error(JSON.stringify(edited.issues));
  const after = runChecks({ job: edited.value.job, tables }).findings;
  expect(after.filter((one) => one.rule === rule && one.parts[0] === finding.parts[0])).toEqual([]);
});
