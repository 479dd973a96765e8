/** Ways in which strings differ that should be alike, as one finding. */
import type { Chemistry, StringPart } from '../job/part.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Severity } from './finding.ts';
import { isOver, missing, PASS, SEVERITY_ORDER, type Verdict, wanted } from './tally.ts';
import { field, list, shortList } from './wording.ts';

/** One way in which strings differ, as part of a sentence. */
export interface Difference {
  readonly severity: Severity;
  readonly words: string;
  readonly measured: { readonly value: number; readonly unit: string };
  readonly limit: { readonly value: number; readonly unit: string };
}

/** One finding for all differences, ranked by the gravest. */
export function toldTogether(one: SolvedCase, who: string, differences: readonly Difference[]): Verdict {
  const rank = ({ severity }: Difference) => SEVERITY_ORDER.indexOf(severity);
  const worst = differences.reduce((most, other) => (rank(other) < rank(most) ? other : most));
  const { measured, limit, severity } = worst;
  return {
    kind: 'fail',
    severity,
    case: one.id,
    measured,
    limit,
    excess: limit.value > 0 ? measured.value / limit.value : Number.POSITIVE_INFINITY,
    message: `${who}: ${differences.map(({ words }) => words).join('; ')}.`,
  };
}

const CHEMISTRY_FAMILY: Readonly<Record<Chemistry, 'lead' | 'lithium' | 'nickel'>> = {
  flooded: 'lead',
  agm: 'lead',
  gel: 'lead',
  lfp: 'lithium',
  nmc: 'lithium',
  nicd: 'nickel',
};

export function familyOf(chemistry: Chemistry): string {
  return CHEMISTRY_FAMILY[chemistry];
}

/** Kinds of lead side by side differ in charge volts only, which is worth a look; anything else is to be put right. */
export function chemistriesApart(strings: readonly StringPart[], how: How): readonly Difference[] {
  const kinds = [...new Set(strings.map(({ chemistry }) => chemistry))];
  if (kinds.length < 2) return [];
  const families = new Set(kinds.map(familyOf));
  const areAllLead = families.size === 1 && families.has('lead');
  return [
    {
      severity: areAllLead && how === 'side by side' ? 'look' : 'fix',
      words: `they are of different chemistry (${list(kinds)}), which ${areAllLead ? 'asks for different charge volts' : 'asks for different charge volts and empties one into the other'}`,
      measured: { value: kinds.length, unit: '1' },
      limit: { value: 1, unit: '1' },
    },
  ];
}

type How = 'side by side' | 'in series';

export function agesApart(context: CheckContext, strings: readonly StringPart[], how: How): readonly Difference[] {
  const ages = strings.flatMap((string) => (string.ageYears === undefined ? [] : [{ string, age: string.ageYears }]));
  if (ages.length < 2) return [];
  const youngest = ages.reduce((least, other) => (other.age < least.age ? other : least));
  const oldest = ages.reduce((most, other) => (other.age > most.age ? other : most));
  const limit = context.job.settings.ageGapYears;
  const gap = oldest.age - youngest.age;
  if (!isOver(gap, limit)) return [];
  return [
    {
      severity: 'look',
      words: `${youngest.string.id} is ${years(youngest.age)} old and ${oldest.string.id} ${years(oldest.age)}, more than ${years(limit)} apart; ${MIXED_AGES[how]}`,
      measured: { value: gap, unit: 'year' },
      limit: { value: limit, unit: 'year' },
    },
  ];
}

const MIXED_AGES: Readonly<Record<How, string>> = {
  'side by side': 'sources disagree on mixing ages, so go by the solved shares',
  'in series': 'the older one ends each discharge and each charge',
};

function years(age: number): string {
  return `${Number(age.toPrecision(3))} ${age === 1 ? 'year' : 'years'}`;
}

/** An age that is not given is missed only where another string of the bank gives its own. */
export function agesMissing(strings: readonly StringPart[]): Verdict {
  const without = strings.filter(({ ageYears }) => ageYears === undefined);
  if (without.length === 0 || without.length === strings.length) return PASS;
  return missing(
    `${shortList(without.map((string) => field(string, 'ageYears')))}: another string beside it gives its own`,
    ...without.map((string) => wanted(string, 'ageYears')),
  );
}
