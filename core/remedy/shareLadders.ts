/** What can be done about strings that share unevenly: leads made alike, or thicker where one is the longer. */
import { type Edit, together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { CablePart, JunctionId, Part, PartId, StringPart } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { conductorOf, thicker } from './cableLadders.ts';
import { type Bench, type Candidate, type Ladder, stepped } from './candidate.ts';

/** Longest lead that is followed, in parts. */
const MOST_IN_LEAD = 6;

interface Lead {
  readonly string: StringPart;
  readonly pole: 'plus' | 'minus';
  readonly cable: CablePart;
}

/** All leads of a pole as long as the longest, then as short as the shortest; then thicker leads for the strings that lag. */
export function evenLeads(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  const strings = ids.flatMap((id) => {
    const part = bench.drawn(id);
    return part?.kind === 'string' ? [part] : [];
  });
  const leads = strings.flatMap((string) =>
    (['plus', 'minus'] as const).flatMap((pole) => leadOf(bench, string, pole)),
  );
  const lagging = leads.filter(({ string }) => isLagging(bench, string, strings));
  const conductors = lagging.flatMap(({ cable }) => conductorOf(bench, cable.id) ?? []);
  return [
    stepped([...alike(leads, strings.length, Math.max), ...alike(leads, strings.length, Math.min)]),
    ...(conductors.length === 0 ? [] : [thicker(bench, conductors)]),
  ];
}

/** The first cable from a pole of a string, behind what stands in line with it; none where the way parts before. */
function leadOf({ job }: Bench, string: StringPart, pole: 'plus' | 'minus'): readonly Lead[] {
  let from: Part = string;
  let junction: JunctionId = string[pole];
  for (let step = 0; step < MOST_IN_LEAD; step++) {
    const next: readonly Part[] = job.parts.filter((part) => part !== from && junctionsOf(part).includes(junction));
    const [only] = next;
    if (only === undefined || next.length > 1) return [];
    if (only.kind === 'cable') return [{ string, pole, cable: only }];
    if (!('from' in only) || typeof only.from !== 'string') return [];
    junction = only.from === junction ? (only.to as JunctionId) : only.from;
    from = only;
  }
  return [];
}

/** Every string has a lead on that pole and they differ: one candidate that makes all of them like the longest or the shortest. */
function alike(
  leads: readonly Lead[],
  strings: number,
  choose: (...lengths: number[]) => number,
): readonly Candidate[] {
  const whole = (['plus', 'minus'] as const)
    .map((pole) => leads.filter((lead) => lead.pole === pole))
    .filter((ofPole) => ofPole.length === strings);
  const changes = whole.flatMap((ofPole) => {
    const lengthM = choose(...ofPole.map(({ cable }) => cable.lengthM));
    return ofPole.filter(({ cable }) => cable.lengthM !== lengthM).map((lead) => ({ ...lead, lengthM }));
  });
  if (changes.length === 0) return [];
  const length = (metres: number) => formatQuantity({ value: metres, unit: 'm', digits: 3 });
  const text = changes.map(
    ({ cable, lengthM }) => `${cable.id} ${length(lengthM)} instead of ${length(cable.lengthM)}`,
  );
  const edits: readonly Edit[] = changes.map(({ cable, lengthM }) =>
    setField({ part: cable.id, field: 'lengthM', value: lengthM }),
  );
  const cost = changes
    .map(({ cable, lengthM }) => `${length(lengthM)} of ${cable.size === undefined ? 'cable' : sizeText(cable.size)}`)
    .join(' and ');
  const amount = changes.reduce((sum, { lengthM }) => sum + lengthM, 0);
  return [
    { edit: together(`All leads of the strings alike: ${text.join(', ')}`, edits), cost, effort: 'cable', amount },
  ];
}

/** Gives less than its fair share by capacity in the finding's case. */
function isLagging({ point }: Bench, string: StringPart, strings: readonly StringPart[]): boolean {
  const given = ({ id }: StringPart) => point.parts.get(id)?.currentA ?? 0;
  const totalA = strings.reduce((sum, one) => sum + given(one), 0);
  const totalAh = strings.reduce((sum, { capacityAh }) => sum + capacityAh, 0);
  return given(string) < (totalA * string.capacityAh) / totalAh;
}
