/** One solar module as a single diode with a series resistance (four parameters; the shunt is neglected). */
import { Defect } from '../job/issue.ts';

/** The three points of a module's label, at 1000 W/m2 and 25 degC cell temperature. */
export interface ModuleLabel {
  readonly vocV: number;
  readonly iscA: number;
  readonly vmpV: number;
  readonly impA: number;
}

/** The two figures of the diode that the label fixes. */
export interface DiodeFit {
  /** a: modified ideality (n Ns k T/q), volts. */
  readonly bendV: number;
  /** Rs. */
  readonly seriesOhm: number;
  /** True where the label points give no Rs >= 0, and Rs = 0 was taken. */
  readonly withoutSeries: boolean;
}

/**
 * I = photoA - darkA [exp((u - darkV)/bendV) - exp(-darkV/bendV)],  u = V + I seriesOhm.
 *
 * The saturation current is written as `darkA` at `darkV` so that no exponential overflows.
 */
export interface DiodeCurve {
  readonly photoA: number;
  readonly darkA: number;
  readonly darkV: number;
  readonly bendV: number;
  readonly seriesOhm: number;
  /** Volts at which the current is zero. */
  readonly openV: number;
}

/** Current and its slope against the terminal volts. */
export interface CurrentAt {
  readonly currentA: number;
  /** dI/dV, never positive. */
  readonly slopeSiemens: number;
}

export interface PowerPoint {
  readonly voltageV: number;
  readonly currentA: number;
  readonly powerW: number;
}

/** Above this many bends over the label's open circuit the exponential goes on as a straight line. */
const STEEPEST = 40;
const MOST_STEPS = 200;

/**
 * Four-parameter fit to the label. Written with L = photo current + saturation current, the three conditions I(Voc) = 0,
 * I(Vmp) = Imp and dP/dV = 0 at Vmp give in closed form
 *
 *   a  = (2 Vmp - Voc) / [ln(1 - Imp/L) + Imp/(L - Imp)]
 *   Rs = [a ln(1 - Imp/L) + Voc - Vmp] / Imp
 *
 * The usual closed form takes L = Isc. The fourth condition, I(0) = Isc, gives L (see `lightAndDark`); repeating the two
 * steps makes all four hold. Where the label gives a <= 0 or Rs < 0, Rs = 0 and `a` is such that the curve still passes the
 * three points (its peak then lies beside Vmp). Needs 0 < Imp < Isc and 0 < Vmp < Voc, else a `Defect`.
 * Source: SRC-SOLAR-FOUR-PARAMETER (from memory; derived above).
 */
export function fitDiode(label: ModuleLabel): DiodeFit {
  const { vocV, iscA, vmpV, impA } = label;
  if (!(impA > 0 && impA < iscA && vmpV > 0 && vmpV < vocV)) {
    throw new Defect(`an array label has 0 < impA < iscA and 0 < vmpV < vocV, not ${impA}, ${iscA}, ${vmpV}, ${vocV}`);
  }
  return fitWithSeries(label) ?? fitWithoutSeries(label);
}

const FIT_ROUNDS = 60;
/** Relative agreement of L from one round to the next that ends the fit. */
const FIT_AGREES = 1e-14;

/** Each round shrinks the error by about exp(-Vmp/a); a label for which that does not end has no fit with Rs. */
function fitWithSeries({ vocV, iscA, vmpV, impA }: ModuleLabel): DiodeFit | undefined {
  let lightA = iscA;
  for (let round = 0; round < FIT_ROUNDS; round += 1) {
    const log = Math.log1p(-impA / lightA);
    const bendV = (2 * vmpV - vocV) / (log + impA / (lightA - impA));
    const seriesOhm = (bendV * log + vocV - vmpV) / impA;
    if (!(bendV > 0 && seriesOhm >= 0 && seriesOhm * iscA < vocV)) return undefined;
    const next = lightAndDark({ bendV, seriesOhm }, iscA, vocV);
    if (Math.abs(next - lightA) <= FIT_AGREES * next) return { bendV, seriesOhm, withoutSeries: false };
    lightA = next;
  }
  return undefined;
}

/** At this many times Voc the bend is a straight line for all purposes. */
const STRAIGHT = 1000;

/**
 * Rs = 0: the bend for which I(Vmp) = Isc (1 - exp[(Vmp - Voc)/a])/(1 - exp[-Voc/a]) is Imp, by bisection; the current at
 * Vmp falls with a. A label below the straight line from Isc to Voc fits no module at all: the straight line is taken.
 */
function fitWithoutSeries({ vocV, iscA, vmpV, impA }: ModuleLabel): DiodeFit {
  let sharp = 0;
  let round = STRAIGHT * vocV;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const bendV = (sharp + round) / 2;
    if (bendV <= sharp || bendV >= round) break;
    const currentA = (iscA * Math.expm1((vmpV - vocV) / bendV)) / Math.expm1(-vocV / bendV);
    if (currentA > impA) sharp = bendV;
    else round = bendV;
  }
  return { bendV: round, seriesOhm: 0, withoutSeries: true };
}

/** L = Isc / (1 - exp[(Isc Rs - Voc)/a]): photo and saturation current together, so that the short circuit carries Isc. */
function lightAndDark({ bendV, seriesOhm }: Pick<DiodeFit, 'bendV' | 'seriesOhm'>, iscA: number, vocV: number): number {
  return iscA / -Math.expm1((iscA * seriesOhm - vocV) / bendV);
}

/**
 * The curve that in full sun carries `fullSunA` at 0 V and nothing at `fullSunOpenV`, lit to `sun` of full sun (> 0).
 */
export function diodeCurve(
  fit: Pick<DiodeFit, 'bendV' | 'seriesOhm'>,
  { fullSunA, fullSunOpenV, sun }: { fullSunA: number; fullSunOpenV: number; sun: number },
): DiodeCurve {
  const { bendV, seriesOhm } = fit;
  const darkA = lightAndDark(fit, fullSunA, fullSunOpenV);
  const base = Math.exp(-fullSunOpenV / bendV);
  const photoA = sun * darkA * (1 - base);
  const openV = fullSunOpenV + bendV * Math.log(photoA / darkA + base);
  return { photoA, darkA, darkV: fullSunOpenV, bendV, seriesOhm, openV };
}

/**
 * Current and slope at terminal volts: the diode equation everywhere. Below 0 V it stays near the photo current; above open
 * circuit the current is negative, since a lit module does not block (a blocking diode is a part of its own) and the network
 * relies on a curve that falls without a flat piece.
 */
export function diodeCurrent(curve: DiodeCurve, voltageV: number): CurrentAt {
  return onDiode(curve, voltageV);
}

/**
 * Newton on f(u) = u - Rs I(u) - V, which rises and is convex: from a start at or right of the root it comes down to the
 * root without ever overshooting.
 */
function onDiode(curve: DiodeCurve, voltageV: number): CurrentAt {
  const { seriesOhm, photoA, openV, bendV } = curve;
  let u = Math.min(voltageV + seriesOhm * photoA, Math.max(openV, voltageV));
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const { currentA, conductance } = atDiode(curve, u);
    const rise = 1 + seriesOhm * conductance;
    const change = (u - seriesOhm * currentA - voltageV) / rise;
    u -= change;
    if (Math.abs(change) <= 1e-13 * (bendV + Math.abs(u))) {
      const end = atDiode(curve, u);
      return { currentA: end.currentA, slopeSiemens: -end.conductance / (1 + seriesOhm * end.conductance) };
    }
  }
  throw new Defect(`the diode equation is solved within ${MOST_STEPS} steps (V = ${voltageV})`);
}

/** Current and -dI/du at diode volts u. */
function atDiode(curve: DiodeCurve, u: number): { readonly currentA: number; readonly conductance: number } {
  const { photoA, darkA, darkV, bendV } = curve;
  const x = (u - darkV) / bendV;
  if (x > STEEPEST) {
    // Far above open circuit the tangent goes on, so that a far guess cannot overflow.
    const steep = darkA * Math.exp(STEEPEST);
    return { currentA: photoA - steep * (1 + x - STEEPEST), conductance: steep / bendV };
  }
  const diodeA = darkA * Math.exp(x);
  return { currentA: photoA - diodeA + darkA * Math.exp(-darkV / bendV), conductance: diodeA / bendV };
}

/**
 * Maximum power point: the root of dP/du = I (1 + 2 Rs g) - u g, g = -dI/du, which has one sign change between u = 0 and
 * open circuit. Bisection to the last bit.
 */
export function diodePeak(curve: DiodeCurve): PowerPoint {
  let low = 0;
  let high = curve.openV;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    const { currentA, conductance } = atDiode(curve, middle);
    if (currentA * (1 + 2 * curve.seriesOhm * conductance) > middle * conductance) low = middle;
    else high = middle;
  }
  const { currentA } = atDiode(curve, low);
  const voltageV = low - curve.seriesOhm * currentA;
  return { voltageV, currentA, powerW: voltageV * currentA };
}
