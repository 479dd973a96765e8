/** How a fuse or breaker behaves in time: the maker's points of the job, or the generic band of its type. */
import type { BreakerPart, FusePart } from '../job/part.ts';
import type { BandRow } from '../tables/deviceTables.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';
import type { BandPoint, DeviceBand } from './answer.ts';
import { type EdgePoint, heldS, openedS } from './bandCurve.ts';

/** What points entered in a job rest on. */
export const ENTERED: Basis = {
  source: 'SRC-JOB-ENTRY',
  text: "entered in the job, from the maker's curve",
  status: 'published',
};

/**
 * The band of a device. The maker's points go before the generic band of its type, and its I²t is used with either. Missing where
 * neither is known: no type, a type or rating that no generic band is held for, and every breaker without points.
 * Sources: SRC-BLADE-BAND, SRC-STRIP-BAND, SRC-CLASS-T-BAND, SRC-CLASS-C-BAND, SRC-TUBE-BAND, SRC-GG-BAND.
 */
export function deviceBandOf(
  device: FusePart | BreakerPart,
  tables: Pick<Tables, 'devices'>,
): DeviceBand | { readonly missing: string } {
  const { id, kind, ratingA, type, curvePoints, preArcI2t, totalI2t } = device;
  const known = {
    device: id,
    kind,
    ratingA,
    type: type ?? '',
    preArcI2t: preArcI2t ?? null,
    totalI2t: totalI2t ?? null,
  };
  if (curvePoints !== undefined && curvePoints.length > 0) {
    const points = curvePoints.map(([currentA, meltS, clearS]) => ({ currentA, meltS, clearS }));
    return { ...known, from: 'maker', points, basis: ENTERED };
  }
  if (kind === 'breaker') return { missing: `curvePoints of breaker ${id}` };
  if (type === undefined) return { missing: `type of fuse ${id}` };
  const rows = (tables.devices.bands.get(bandName(type)) ?? []).filter(
    ({ fromA, toA }) => ratingA >= fromA && ratingA <= toA,
  );
  const [first] = rows;
  if (first === undefined) return { missing: `curvePoints of fuse ${id}` };
  const basis = { ...first.basis, status: weakest(...rows.map((row) => row.basis.status)) };
  return { ...known, from: 'generic', points: pointsOf(rows, ratingA), basis };
}

/** A type as the table names it, however it was typed: `Class T`, `class-t`. */
export function bandName(type: string): string {
  return type
    .trim()
    .toLowerCase()
    .replaceAll(/[\s-]+/g, '_');
}

/**
 * Rows laid together: at each current both edges, the one that a row does not give read off between that edge's own points. How long a
 * fuse holds at a test point of opening is not read off so: from a light overload to the next known holding its curve falls far below
 * the straight line, so that next holding counts.
 */
function pointsOf(rows: readonly BandRow[], ratingA: number): readonly BandPoint[] {
  const placed = rows.map((row) => ({ ...row, currentA: row.per === 'rating' ? row.at * ratingA : row.at }));
  placed.sort((a, b) => a.currentA - b.currentA);
  const edge = (of: 'holdsS' | 'opensS'): readonly EdgePoint[] =>
    placed.flatMap(({ currentA, [of]: timeS }) => (timeS === undefined ? [] : [{ currentA, timeS }]));
  const [holds, opens] = [edge('holdsS'), edge('opensS')];
  return placed
    .filter(({ currentA }, index) => currentA !== placed[index - 1]?.currentA)
    .map(({ currentA, per }) => ({
      currentA,
      meltS: per === 'rating' ? (holds.find((hold) => hold.currentA >= currentA)?.timeS ?? 0) : heldS(holds, currentA),
      clearS: openedS(opens, currentA),
    }));
}
