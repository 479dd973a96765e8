/** Conductor sizes in both notations. The second is for orientation only, marked ≈, and never used for a sum. */
import { areaOf, awgDiameterMm, MM2_PER_CMIL } from '../conductor/size.ts';
import type { ConductorSize } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import { sizeText } from '../units/conductorSize.ts';
import { plain } from './figures.ts';

const LARGEST_GAUGE = -3;
const SMALLEST_GAUGE = 40;
/** Above 4/0 the trade counts in kcmil; between the two the nearer name is told. */
const LARGEST_GAUGE_REACH = 1.1;

/** A size as it was given, e.g. `35 mm²`, `2/0 AWG`, kept on one line. */
export function sizeAsGiven(size: ConductorSize): string {
  return sizeText(size).replaceAll(' ', '\u00a0');
}

/** The same size in the other notation, or `undefined` where the tables do not know it. */
export function sizeOtherwise(size: ConductorSize, tables: ConductorTables): string | undefined {
  if (size.system === 'mm2') return `≈ ${nearestUsSize(size.areaMm2)}`;
  const area = areaOf(size, tables);
  return 'missing' in area ? undefined : `≈ ${plain(Number(area.value.toPrecision(3)))}\u00a0mm²`;
}

/** The nearest gauge by area, told up to 4/0, beyond which sizes go by kcmil. */
function nearestUsSize(areaMm2: number): string {
  if (areaMm2 > awgAreaMm2(LARGEST_GAUGE) * LARGEST_GAUGE_REACH) {
    return sizeAsGiven({ system: 'kcmil', areaKcmil: Math.round(areaMm2 / MM2_PER_CMIL / 1000) });
  }
  let nearest = SMALLEST_GAUGE;
  for (let gauge = LARGEST_GAUGE; gauge <= SMALLEST_GAUGE; gauge += 1) {
    if (distance(gauge, areaMm2) < distance(nearest, areaMm2)) nearest = gauge;
  }
  return sizeAsGiven({ system: 'awg', gauge: nearest });
}

function distance(gauge: number, areaMm2: number): number {
  return Math.abs(Math.log(awgAreaMm2(gauge) / areaMm2));
}
function awgAreaMm2(gauge: number): number {
  return (Math.PI / 4) * awgDiameterMm(gauge) ** 2;
}
