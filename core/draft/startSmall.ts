/**
 * A whole small job from a handful of figures: bank, fuse, switch, one run, one load. Cable size and fuse are chosen by the rules
 * that judge every job; what was not asked for is put in as a marked guess or default, so that the answer shows what it rests on.
 */
import { runChecks } from '../checks/runChecks.ts';
import { sizesOf } from '../conductor/size.ts';
import { Defect, type Issue, type Result } from '../job/issue.ts';
import type { CheckedJob, Practice } from '../job/job.ts';
import { currentVersion } from '../job/migrate.ts';
import type { ConductorSize } from '../job/part.ts';
import { missingFigures } from '../network/figures.ts';
import type { Tables } from '../tables/tables.ts';
import { sizeText } from '../units/conductorSize.ts';
import { type Draft, type Edited, editedOf } from './draft.ts';
import { type ProtectedRun, protectedRun } from './protectedRun.ts';
import { designCurrentA, type SmallJob } from './smallJob.ts';
import { type Chosen, smallParts } from './smallParts.ts';

/**
 * The job for a small system, with the smallest listed cable that its practice has nothing to stop or fix about and that loses no
 * more than the practice's drop limit. Where the bank is too small whatever the cable, the smallest that is right as far as can be
 * judged; where no listed size will do, the largest: the findings then say what is wrong. Issues where a figure is no figure of a job.
 */
export function startSmall(small: SmallJob, tables: Tables): Result<Edited, readonly Issue[]> {
  const sizes = smallSizes(small.practice, tables);
  let rightByItself: Edited | undefined;
  let last: Edited | undefined;
  for (const size of sizes) {
    const chosen = chosenFor(small, size, { tables, leadSizes: sizes });
    // A cable that no fuse fits need not be solved, unless there is nothing larger.
    if (chosen === undefined && size !== sizes.at(-1)) continue;
    const made = editedOf(smallDraft(small, chosen ?? unfit(small, size, tables)));
    if (!made.ok) return made;
    last = made.value;
    const { ofCable, ofOthers } = troubleIn(last.job, tables);
    if (!ofCable && !ofOthers) return made;
    if (!ofCable) rightByItself ??= last;
  }
  if (last === undefined) throw new Defect('every practice has sizes of conductors');
  return { ok: true, value: rightByItself ?? last };
}

/** Rules that another cable or fuse would satisfy. */
const cableRules: ReadonlySet<string> = new Set([
  'drop-too-big',
  'cable-overloaded',
  'cable-under-continuous',
  'fuse-over-cable',
  'small-wire-cap',
  'fuse-under-current',
  'fuse-under-continuous',
]);

/** What is to be stopped or fixed, and any volts lost beyond the limit of the load's class. */
function troubleIn(job: CheckedJob, tables: Tables): { readonly ofCable: boolean; readonly ofOthers: boolean } {
  if (missingFigures({ job, tables }).length > 0) return { ofCable: true, ofOthers: false };
  const serious = runChecks({ job, tables }).findings.filter(
    ({ severity, rule }) => severity === 'stop' || severity === 'fix' || rule === 'drop-too-big',
  );
  return {
    ofCable: serious.some(({ rule }) => cableRules.has(rule)),
    ofOthers: serious.some(({ rule }) => !cableRules.has(rule)),
  };
}

/** Sizes that the practice's country sells, rising, from the thinnest that is worth laying to a battery. */
function smallSizes(practice: Practice, tables: Tables): readonly ConductorSize[] {
  const isAmerican = practice === 'us-land' || practice === 'us-marine';
  const sizes = isAmerican
    ? [...sizesOf('awg', tables.conductors), ...sizesOf('kcmil', tables.conductors)]
    : sizesOf('mm2', tables.conductors);
  const from = sizes.findIndex((size) => sizeText(size) === (isAmerican ? thinnest.us : thinnest.metric));
  return sizes.slice(Math.max(0, from));
}

/** Thinner wire breaks at a battery's terminals. Common practice, no source. */
const thinnest = { metric: '2.5 mm2', us: '12 AWG' } as const;

interface Choice {
  readonly tables: Tables;
  readonly leadSizes: readonly ConductorSize[];
}

/** Main run of that size with its fuse, and string leads with theirs; `undefined` where no standard fuse fits. */
function chosenFor(small: SmallJob, size: ConductorSize, { tables, leadSizes }: Choice): Chosen | undefined {
  const at = { practice: small.practice, systemV: small.systemV, tables };
  const designA = designCurrentA(small);
  const main = protectedRun({ ...at, size, currentA: designA });
  if (main === undefined) return undefined;
  if (small.blocksInParallel < 2) return { main, lead: main, designA };
  const stringA = perStringA(designA, small.blocksInParallel);
  const leads = leadSizes.map((leadSize) => protectedRun({ ...at, size: leadSize, currentA: stringA }));
  const lead = leads.find((candidate) => candidate !== undefined);
  return lead === undefined ? undefined : { main, lead, designA };
}

/** What one string gives while another is out. */
function perStringA(designA: number, strings: number): number {
  return designA / Math.max(1, strings - 1);
}

/** The largest cable with the fuse that the load needs, though the one does not protect the other: the findings say so. */
function unfit(small: SmallJob, size: ConductorSize, tables: Tables): Chosen {
  const designA = designCurrentA(small);
  const series = tables.devices.ratings.get(tables.practices[small.practice].standardRatings)?.ratingsA ?? [];
  const neededA = designA * tables.practices[small.practice].continuousFactor.value;
  const run: ProtectedRun = { size, ratingA: series.find((ratingA) => ratingA >= neededA) ?? series.at(-1) ?? neededA };
  return { main: run, lead: run, designA };
}

function smallDraft(small: SmallJob, chosen: Chosen): Draft {
  const { title, practice, systemV, chemistry } = small;
  return {
    format: 'ohmwright-job',
    version: currentVersion,
    title,
    practice,
    junctions: { 'main minus': { reference: true } },
    parts: smallParts(small, chosen),
    cases: [
      {
        id: 'night',
        label: 'At night, bank at 70 %, nothing charging',
        stateOfCharge: 0.7,
        irradianceWPerM2: 0,
      },
    ],
    targets: { systemV, chemistry },
  };
}
