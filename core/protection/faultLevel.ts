/** Prospective fault currents of a job in one operating case. */
import type { JunctionId } from '../job/part.ts';
import type { FaultCurrent, FaultStudy, JunctionFault } from './answer.ts';
import { deviceFaults } from './deviceFaults.ts';
import { EARTH_JUNCTION, type FaultModel, faultCurrent, leastCurrent, withFaultModel } from './faultModel.ts';
import { type FaultRequest, sourceOf } from './faultSources.ts';

/**
 * The bolted-fault current at every junction against its island's reference, or against `to`, and through every device; where a
 * bond to earth exists, from every junction to earth as well (after the others in the list).
 *
 *   plain       I = V / R_Thévenin with the figures' own values (as in `faultString`), conductors at 20 degC for the highest
 *   iec-61660   the battery branch of IEC 61660-1: 0.9 R first, 0.95 E behind R settled
 *
 * Highest: every source of the case; chargers, converters, controllers and arrays give their rated output at most. Lowest: low
 * bound of EMF, high bound of resistance, conductors at what their insulation bears (else 70 degC), the one bank that sends least
 * of those that can be switched off one by one, electronic sources nothing. Volts in V, currents in A, ohms.
 * A job whose conductors have no resistance (`missingFigures`) throws a `Defect`.
 */
export function faultLevel(request: FaultRequest): FaultStudy {
  return withFaultModel(request, (model) => ({
    case: request.operatingCase.id,
    method: request.method,
    junctions: [...model.junctions.flatMap((at) => poleFault(model, at)), ...earthFaults(model)],
    devices: deviceFaults(model),
    assumed: assumed(model),
  }));
}

function poleFault(model: FaultModel, at: JunctionId): readonly JunctionFault[] {
  const to = model.request.to ?? model.referenceOf.get(at);
  return to === undefined || to === at ? [] : [junctionFault(model, at, to)];
}

function earthFaults(model: FaultModel): readonly JunctionFault[] {
  if (model.request.to === EARTH_JUNCTION || !model.junctions.includes(EARTH_JUNCTION)) return [];
  return model.junctions.flatMap((at) => {
    const isPole = model.referenceOf.get(at) === EARTH_JUNCTION && model.request.to === undefined;
    if (at === EARTH_JUNCTION || isPole || model.referenceOf.get(at) === undefined) return [];
    const fault = junctionFault(model, at, EARTH_JUNCTION);
    return fault.highest === null ? [] : [fault];
  });
}

function junctionFault(model: FaultModel, junction: JunctionId, to: JunctionId): JunctionFault {
  const highest = faultCurrent(model.most, junction, to);
  const lowest = leastCurrent(model, junction, to);
  return { junction, to, highest, lowest: highest === null || lowest === null ? lowest : atMost(lowest, highest) };
}

/** Strings of unlike volts may drive more between two points of one pole when they are weak: the lesser of two stands. */
function atMost(lowest: FaultCurrent, highest: FaultCurrent): FaultCurrent {
  return lowest.firstA > highest.firstA || lowest.settledA > highest.settledA ? highest : lowest;
}

function assumed({ parts, request, limited }: FaultModel): readonly string[] {
  const strings = parts.flatMap((part) => (part.kind === 'string' ? sourceOf(part, request).assumed : []));
  const hot = parts.filter((part) => part.kind === 'cable' && part.insulationDegC === undefined).length;
  const lines = [...new Set(strings)];
  if (hot > 0) {
    const cables = `${hot} conductor${hot === 1 ? '' : 's'} without a temperature of the insulation`;
    lines.push(`insulationDegC: ${cables}, taken at 70 degC for the lowest fault`);
  }
  if (limited.length > 0) {
    const names = limited.map(({ part }) => part).join(', ');
    lines.push(
      `outputA: ${names} taken to give the whole of the rated output into the highest fault, nothing into the lowest`,
    );
  }
  return lines;
}
