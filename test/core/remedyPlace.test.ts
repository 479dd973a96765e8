/** Remedies of the rules about place, limits and arrays: each is tried on the job, and the finding is then gone. */
import { expect, test } from 'vitest';
import { applyEdit, draftOf, remedyTrials, runChecks } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { battery, oneCircuit, type RawJob, type RawPart } from './checksJob.ts';

const lead = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 3,
  size: '10 mm2',
  ...fields,
});
const array = (fields: Record<string, unknown> = {}): RawPart => ({
  id: 'A1',
  kind: 'array',
  plus: 'A+',
  minus: 'K-',
  modulesInSeries: 3,
  stringsInParallel: 2,
  vocV: 42,
  iscA: 9.2,
  vmpV: 34,
  impA: 8.6,
  vocPerDegC: -0.003,
  maxFuseA: 30,
  ...fields,
});
const controller = (fields: Record<string, unknown> = {}): RawPart => ({
  id: 'K1',
  kind: 'controller',
  from: { plus: 'K+', minus: 'K-' },
  to: { plus: 'P', minus: 'N' },
  type: 'mppt',
  outputA: 30,
  maxInputV: 100,
  setpointV: 14.2,
  ...fields,
});
const solar = (arrayFields: Record<string, unknown>, controllerFields: Record<string, unknown>): RawJob => ({
  site: { ambientMinDegC: -20, ambientDesignDegC: 30, ambientMaxDegC: 40 },
  parts: [battery('B1'), array(arrayFields), lead('C1', 'A+', 'K+'), controller(controllerFields)],
});
const bond = (size: string) => [{ id: 'E1', kind: 'bond', from: 'M', to: 'earth', size, lengthM: 2 }];
const curvePoints = [
  [100, 2, 10],
  [200, 1, 5],
];

test.each<readonly [rule: string, job: RawJob, label: RegExp]>([
  ['pv-volts-cold', solar({}, {}), /2 in series by 3 instead of 3 by 2/],
  ['pv-volts-cold', solar({ modulesInSeries: 1, stringsInParallel: 1, vocV: 99 }, {}), /one for 150 V at its input/],
  ['pv-volts-hot', solar({ modulesInSeries: 1 }, { setpointV: 40 }), /2 in series/],
  ['controller-amps', solar({ stringsInParallel: 1 }, { maxInputA: 10 }), /one for 15 A at its input/],
  ['pv-cable-156', solar({ stringsInParallel: 8, maxFuseA: 200 }, {}), /Cable C1: 35 mm² instead of 10 mm²/],
  [
    'pv-wrong-way',
    {
      parts: [battery('B1'), array({ minus: 'N', modulesInSeries: 1, vocV: 21, vmpV: 17 }), lead('C1', 'A+', 'P')],
    },
    /blocking diode/,
  ],
  ['ac-part-on-dc', oneCircuit({ fuse: { dcRated: false } }), /marked for direct current/],
  [
    'big-bank-needs-more',
    oneCircuit({ battery: { capacityAh: 600, shortCircuitA: 9000 }, fuse: { interruptA: 2000 } }),
    /breaks 20 kA at 125 V/,
  ],
  ['bond-too-small', oneCircuit({ more: bond('4 mm2') }), /Bond E1: 6 mm² instead of 4 mm²/],
  ['wrong-metal-or-solid', oneCircuit({ practice: 'us-marine', cable: { stranding: 'solid' } }), /stranded copper/],
  ['cable-too-thin', oneCircuit({ cable: { size: '1 mm2' } }), /1.5 mm² instead of 1 mm²/],
  [
    'fuse-over-device-limit',
    oneCircuit({ fuse: { ratingA: 60 }, load: { currentA: 10, maxFuseA: 30 } }),
    /Fuse F1: 25 A instead of 60 A/,
  ],
  [
    'fuse-warm',
    oneCircuit({ fuse: { ratingA: 50, ambientDegC: 70 }, load: { currentA: 46, continuous: false } }),
    /Fuse F1: 63 A instead of 50 A/,
  ],
  [
    'nuisance-blow',
    oneCircuit({ fuse: { ratingA: 50, curvePoints }, load: { powerW: 200, surgeW: 1500, surgeS: 5 } }),
    /Fuse F1: (125|160) A/,
  ],
])('%s goes by: %#', (rule, raw, label) => {
  const text = JSON.stringify({
    format: 'ohmwright-job',
    version: 1,
    title: 'a job for a test',
    practice: 'iec-land',
    ...raw,
  });
  const opened = draftOf(text);
  if (!opened.ok) throw new Error(JSON.stringify(opened.issues));
  const { draft, job } = opened.value;
  const report = runChecks({ job, tables });
  const finding = report.findings.find((one) => one.rule === rule);
  if (finding === undefined) throw new Error(`no finding of ${rule}`);
  const trials = remedyTrials({ draft, job, tables, finding, report });
  const trial = trials.find((one) => label.test(one.label));
  expect(trials.map((one) => one.label).join('; ')).toMatch(label);
  expect(trial!.stillThere).toBe(false);
  const edited = applyEdit(draft, trial!.edit, tables);
  if (!edited.ok) throw new Error(JSON.stringify(edited.issues));
  const after = runChecks({ job: edited.value.job, tables }).findings;
  expect(after.filter((one) => one.rule === rule && one.parts[0] === finding.parts[0])).toEqual([]);
});
