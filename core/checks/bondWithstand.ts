/** A bond to earth while a fault to earth flows through it. */
import type { BondPart, PartId } from '../job/part.ts';
import { type Device, isDevice, isOpen } from '../network/wiring.ts';
import { clearingOf, provenance } from '../protection/clearing.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { EARTH_JUNCTION, withFaultModel } from '../protection/faultModel.ts';
import { NOTHING_A } from '../protection/faultState.ts';
import { smallestAreaMm2, type Withstand, withstandOf } from '../protection/withstand.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { mainDevices } from './mainDevices.ts';
import { ELSEWHERE, isUnder, missing, PASS, type Verdict, wanted } from './tally.ts';
import { amps, titleOf, together } from './wording.ts';

const ADIABATIC: Basis = {
  source: 'SRC-IEC60364-54',
  text: 'IEC 60364-5-54 clause 543, S at least the square root of I²t, over k',
  status: 'from-memory',
};

/**
 * For a bond to earth: a fault to earth right behind a device next to the strings flows back through the bond until the device has
 * opened; the whole of it, where several bonds share it. S ≥ √(I²t)/k, k as of an insulated copper conductor. What lies behind
 * other devices lies behind these as well. A generic band has a shortest and a longest time: between them nothing is decided.
 */
export function bondWithstand(context: CheckContext, bond: BondPart, areaMm2: number): readonly Verdict[] {
  if (bond.from !== EARTH_JUNCTION && bond.to !== EARTH_JUNCTION) return [];
  const { id, size } = bond;
  const conductor = { id, size, metal: undefined, insulationDegC: undefined, inParallel: 1 };
  const withstand = withstandOf(conductor, context.tables);
  if ('missing' in withstand) return [missing(withstand.missing, wanted(bond, 'size'))];
  return earthFaultsOf(context).map((fault) => verdictFor(context, { bond, areaMm2, withstand, ...fault }));
}

interface EarthFault {
  readonly one: SolvedCase;
  readonly device: Device;
  readonly currentA: number;
}

const ofContext = new WeakMap<CheckContext, readonly EarthFault[]>();

function earthFaultsOf(context: CheckContext): readonly EarthFault[] {
  let faults = ofContext.get(context);
  if (faults === undefined) {
    const devices = mainDevices(context).map(({ device }) => device.id);
    faults = unlikeWiring(context).flatMap((one) => earthFaults(context, one, devices));
    ofContext.set(context, faults);
  }
  return faults;
}

/** One case for each way in which devices and switches stand: strings count as full, so nothing else of a case matters. */
function unlikeWiring({ cases }: CheckContext): readonly SolvedCase[] {
  const byOpen = new Map<string, SolvedCase>();
  for (const one of cases) {
    const open = one.parts.flatMap((part) => (isOpen(part) ? [part.id] : []));
    const key = JSON.stringify(open);
    if (!byOpen.has(key)) byOpen.set(key, one);
  }
  return [...byOpen.values()];
}

/** The most that a device carries into a fault to earth at either of its ends, plain Thévenin, strings full and stiff. */
function earthFaults(context: CheckContext, one: SolvedCase, ids: readonly PartId[]): readonly EarthFault[] {
  const { job, tables } = context;
  const request = { job, tables, operatingCase: one.operatingCase, method: 'plain', figures: 'bounds' } as const;
  return withFaultModel(request, (model) =>
    ids.flatMap((id): readonly EarthFault[] => {
      const device = one.part(id);
      if (!isDevice(device) || device.state === 'open') return [];
      const currents = [device.from, device.to].map((end) => {
        const fault = model.most.first.fault(end, EARTH_JUNCTION);
        return fault === null ? 0 : Math.abs(fault.through(id) ?? fault.currentA);
      });
      const currentA = Math.max(...currents);
      return currentA > NOTHING_A ? [{ one, device, currentA }] : [];
    }),
  );
}

interface Stressed extends EarthFault {
  readonly bond: BondPart;
  readonly areaMm2: number;
  readonly withstand: Withstand;
}

function verdictFor(context: CheckContext, stressed: Stressed): Verdict {
  const { bond, areaMm2, withstand, one, device, currentA } = stressed;
  const band = deviceBandOf(device, context.tables);
  const open = ': how long a fault to earth lasts in the bond';
  if ('missing' in band) {
    const name = band.missing.startsWith('type') ? 'type' : 'curvePoints';
    return missing(`${band.missing}${open}`, wanted(device, name));
  }
  const { letThroughI2t, holdS } = clearingOf({ band, currentA });
  // A current that need not open the device at all is told by the rule about weak faults.
  if (letThroughI2t === null) return ELSEWHERE;
  const leastMm2 = smallestAreaMm2({ i2t: letThroughI2t, k: withstand.k });
  if (!isUnder(areaMm2, leastMm2)) return PASS;
  const surelyMm2 = smallestAreaMm2({ i2t: currentA ** 2 * (holdS ?? 0), k: withstand.k });
  if (band.from === 'generic' && !isUnder(areaMm2, surelyMm2)) {
    return missing(`curvePoints of ${device.kind} ${device.id}${open}`, wanted(device, 'curvePoints'));
  }
  return {
    kind: 'fail',
    severity: 'fix',
    case: one.id,
    measured: { value: areaMm2, unit: 'mm2' },
    limit: { value: leastMm2, unit: 'mm2' },
    excess: leastMm2 / areaMm2,
    message: `${titleOf(bond)} is ${bond.size === undefined ? 'of no size' : sizeText(bond.size)}; a fault to earth behind ${device.kind} ${device.id} sends up to ${amps(currentA)} through it until that opens, which asks for ${leastMm2.toPrecision(3)} mm² (${provenance(band)}).`,
    basis: together(ADIABATIC, withstand.basis, band.basis),
    others: [device.id],
  };
}
