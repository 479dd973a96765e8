/** The findings as they stand in the list: each with a lasting name, filtered by what the person asks for. */
import type { CheckedJob, Finding, PartId, RuleFamily, Severity } from '../../../core/api.ts';
import { checkRules, partName, plainFields, SEVERITIES } from '../../../core/api.ts';

/** A finding under a name that stays the same while figures change. */
export interface ListedFinding {
  readonly key: string;
  readonly finding: Finding;
}

/** What to show; an empty set or text leaves nothing out. */
export interface FindingFilter {
  readonly severities: ReadonlySet<Severity>;
  readonly part: string;
  readonly case: string;
  readonly family: string;
  readonly text: string;
}

export const NO_FILTER: FindingFilter = { severities: new Set(), part: '', case: '', family: '', text: '' };

export function isFiltered(filter: FindingFilter): boolean {
  const { severities, part, case: caseId, family, text } = filter;
  return severities.size > 0 || part !== '' || caseId !== '' || family !== '' || text.trim() !== '';
}

/** The name of a finding: what is judged, and of which parts. */
export function findingName({ rule, parts }: Finding): string {
  return [rule, ...parts].join(' ');
}

/** The findings in the order in which the checks rank them, worst first. */
export function listed(findings: readonly Finding[]): readonly ListedFinding[] {
  const seen = new Map<string, number>();
  return findings.map((finding) => {
    const name = findingName(finding);
    const before = seen.get(name) ?? 0;
    seen.set(name, before + 1);
    return { key: before === 0 ? name : `${name} #${String(before + 1)}`, finding };
  });
}

const families: ReadonlyMap<string, RuleFamily> = new Map(checkRules.map(({ id, family }) => [id, family]));
const titles: ReadonlyMap<string, string> = new Map(checkRules.map(({ id, title }) => [id, title]));

export const FAMILY_WORDS: Readonly<Record<RuleFamily, string>> = {
  wiring: 'How it is wired',
  cable: 'Cables',
  fuse: 'Fuses and breakers',
  rating: 'Ratings of parts',
  voltage: 'Volts at the loads',
  battery: 'Battery strings',
  strings: 'Strings as one bank',
  charging: 'Charging',
  solar: 'Solar',
};

export function familyOf(rule: string): RuleFamily | undefined {
  return families.get(rule);
}

/** The rule's own title, as `Fuse larger than its cable carries`. */
export function ruleTitle(rule: string): string {
  return titles.get(rule) ?? rule.replaceAll('-', ' ');
}

/** The drawn part that an answer's part belongs to: the two conductors of an out-and-back run are one part. */
export function drawnPart(job: CheckedJob, id: PartId): PartId {
  if (job.parts.some((part) => part.id === id)) return id;
  return id.replace(/\.(?:plus|minus)$/, '') as PartId;
}

export function drawnParts(job: CheckedJob, ids: readonly PartId[]): readonly PartId[] {
  return [...new Set(ids.map((id) => drawnPart(job, id)))];
}

export function filtered(
  all: readonly ListedFinding[],
  filter: FindingFilter,
  job: CheckedJob,
): readonly ListedFinding[] {
  const words = filter.text.toLowerCase().split(/\s+/).filter(Boolean);
  return all.filter(({ finding }) => {
    if (filter.severities.size > 0 && !filter.severities.has(finding.severity)) return false;
    if (filter.part !== '' && !drawnParts(job, finding.parts).includes(filter.part as PartId)) return false;
    if (filter.case !== '' && finding.case !== filter.case) return false;
    if (filter.family !== '' && familyOf(finding.rule) !== filter.family) return false;
    if (words.length === 0) return true;
    const told = textOf(finding, job);
    return words.every((word) => told.includes(word));
  });
}

function textOf(finding: Finding, job: CheckedJob): string {
  const where = finding.parts.map((id) => partName(job, id)).join(' ');
  const parts = [ruleTitle(finding.rule), plainFields(finding.message), plainFields(finding.remedy), finding.basis];
  return [where, ...parts].join(' ').toLowerCase();
}

/** How many findings of each severity, worst first; severities without any are left out. */
export function severityCounts(findings: readonly Finding[]): readonly (readonly [Severity, number])[] {
  return SEVERITIES.flatMap((severity) => {
    const count = findings.filter((finding) => finding.severity === severity).length;
    return count === 0 ? [] : [[severity, count] as const];
  });
}

/** What can be chosen: only parts, cases and families that some finding is about. */
export function choices(
  all: readonly ListedFinding[],
  job: CheckedJob,
): { readonly parts: readonly PartId[]; readonly cases: readonly string[]; readonly families: readonly RuleFamily[] } {
  const found = new Set(all.flatMap(({ finding }) => drawnParts(job, finding.parts)));
  const cases = new Set(all.map(({ finding }) => finding.case));
  const told = new Set(all.map(({ finding }) => familyOf(finding.rule)));
  return {
    parts: job.parts.map(({ id }) => id).filter((id) => found.has(id)),
    cases: job.cases.map(({ id }) => id).filter((id) => cases.has(id)),
    families: (Object.keys(FAMILY_WORDS) as RuleFamily[]).filter((family) => told.has(family)),
  };
}

/** The case by its label. */
export function caseWords(job: CheckedJob, id: string): string {
  const label = job.cases.find((one) => one.id === id)?.label ?? id.replaceAll(/[-_]/g, ' ');
  return label.charAt(0).toUpperCase() + label.slice(1);
}
