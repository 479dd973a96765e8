/** What rules rest on where no table holds a figure: laws, the job's own figures, and clauses that give words, not numbers. */
import { originOf } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { field } from './wording.ts';

/** Follows from Kirchhoff's rules and the drawing; recomputed by the tests. */
export const CIRCUIT_LAW: Basis = {
  source: 'SRC-CIRCUIT-LAW',
  text: "Kirchhoff's rules (1845) and Ohm's law (1827) on the network as drawn",
  status: 'published',
};

export const COMMON_PRACTICE: Basis = {
  source: 'SRC-PRACTICE',
  text: 'common practice, no source',
  status: 'common-practice',
};

/** Devices are to be rated for the volts at which they open; testing against the highest volts is ours and stricter. */
export const VOLTS_RATING: Basis = {
  source: 'SRC-VOLTS-RATING',
  text: '33 CFR 183.455(d); ISO 13590:2018 (at least nominal); NEC (NFPA 70), numbering of 2023, 110.4; tested here against the highest volts, which is stricter (common practice)',
  status: 'common-practice',
};

/** Why a part may not carry more than its own rating. */
export const PART_RATING: Basis = {
  source: 'SRC-NEC-110-3B',
  text: "the part's own rating; NEC (NFPA 70), numbering of 2023, 110.3(B), use as listed and labelled, second-hand",
  status: 'published',
};

/** Protection at the source. */
export const FUSE_AT_SOURCE: Basis = {
  source: 'SRC-CFR33-183-455',
  text: '33 CFR 183.455(a); NEC (NFPA 70), numbering of 2023, 240.21; 46 CFR 111.15-25(a)',
  status: 'published',
};

/** A figure that the job gives for a part, as a limit: as good as where it comes from. */
export function entered(part: SinglePart, name: string): Basis {
  const origin = originOf(part, name);
  const status = origin === 'guess' ? 'from-memory' : 'published';
  return { source: 'SRC-JOB-ENTRY', text: `${field(part, name)} as entered (${origin})`, status };
}
