/** Modules wired otherwise, controllers of another size, a diode in the lead of an array. */
import { insertInto } from '../draft/connect.ts';
import { type Edit, together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { ArrayPart, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';

/** Volts and amperes that controllers are sold for; common practice, no source. */
const CONTROLLER_VOLTS: readonly number[] = [50, 75, 100, 150, 200, 250, 450, 600];
const CONTROLLER_AMPS: readonly number[] = [10, 15, 20, 30, 35, 40, 45, 50, 60, 70, 80, 85, 100, 120];
/** Forward volts of a blocking diode; common practice, no source. */
const BLOCKING_DIODE_V = 0.5;
const MOST_RUNGS = 4;

/** The arrays among the parts of a finding. */
function arraysIn(bench: Bench, ids: readonly PartId[]): readonly ArrayPart[] {
  return ids.flatMap((id) => {
    const part = bench.drawn(id);
    return part?.kind === 'array' ? [part] : [];
  });
}

/** The same modules in shorter strings where they divide, then fewer modules. */
export function fewerInSeries(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  return arraysIn(bench, ids).map((array): Ladder => {
    const { modulesInSeries: now, stringsInParallel } = array;
    const shorter = Array.from({ length: now - 1 }, (_, k) => now - 1 - k);
    const rungs = shorter.flatMap((series): readonly Candidate[] => {
      const modules = now * stringsInParallel;
      const strings = modules % series === 0 ? modules / series : stringsInParallel;
      return [rewired(array, series, strings)];
    });
    return stepped(rungs.slice(0, MOST_RUNGS));
  });
}

/** One or two more modules in every string. */
export function moreInSeries(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  return arraysIn(bench, ids).map((array) =>
    stepped([1, 2].map((more) => rewired(array, array.modulesInSeries + more, array.stringsInParallel))),
  );
}

function rewired(array: ArrayPart, series: number, strings: number): Candidate {
  const label = `Array ${nameOf(array)}: ${series} in series by ${strings} instead of ${array.modulesInSeries} by ${array.stringsInParallel}`;
  const now = array.modulesInSeries * array.stringsInParallel;
  const change = series * strings - now;
  const edit = together(label, [
    setField({ part: array.id, field: 'modulesInSeries', value: series }),
    setField({ part: array.id, field: 'stringsInParallel', value: strings }),
  ]);
  const cost =
    change === 0 ? 'the same modules, wired anew' : `${Math.abs(change)} modules ${change < 0 ? 'fewer' : 'more'}`;
  return {
    edit,
    cost,
    effort: change === 0 ? 'cable' : change < 0 ? 'part-away' : 'part-in',
    amount: Math.abs(change),
  };
}

/** Controllers that stand what the finding measured. */
export function otherController(
  bench: Bench,
  id: PartId,
  field: 'maxInputV' | 'maxInputA' | 'outputA',
): readonly Ladder[] {
  const controller = bench.drawn(id);
  if (controller?.kind !== 'controller') return [];
  const unit = field === 'maxInputV' ? 'V' : 'A';
  const neededFrom = bench.finding.measured.value;
  const fitting = (unit === 'V' ? CONTROLLER_VOLTS : CONTROLLER_AMPS).filter((value) => value >= neededFrom);
  const rungs = fitting.slice(0, MOST_RUNGS).map((value): Candidate => {
    const text = formatQuantity({ value, unit });
    const where = field === 'outputA' ? '' : ' at its input';
    const label = `Controller ${nameOf(controller)}: one for ${text}${where}`;
    const edit = together(label, [setField({ part: id, field, value })]);
    return { edit, cost: `one controller for ${text}${where}`, effort: 'device', amount: value };
  });
  return [stepped(rungs)];
}

/** A blocking diode right behind the plus of an array. */
export function blockingDiode(bench: Bench, id: PartId): readonly Ladder[] {
  const array = bench.drawn(id);
  if (array?.kind !== 'array') return [];
  const leads = bench.job.parts.flatMap((part): readonly { cable: string; end: 'from' | 'to' }[] => {
    if (part.kind === 'cable' && part.from === array.plus) return [{ cable: part.id, end: 'from' }];
    if (part.kind === 'pair' && part.from.plus === array.plus) return [{ cable: `${part.id}.plus`, end: 'from' }];
    return [];
  });
  const [lead, ...others] = leads;
  if (lead === undefined || others.length > 0) return [];
  const diode = { kind: 'diode' as const, forwardV: BLOCKING_DIODE_V };
  const edit: Edit = relabelled(insertInto({ ...lead, part: diode }), `A blocking diode right behind ${nameOf(array)}`);
  return [stepped([{ edit, cost: 'one blocking diode', effort: 'part-in', amount: 1 }])];
}
