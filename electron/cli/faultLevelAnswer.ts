/** What `faultlevel --json` prints: the keys that the contract states, over all cases asked for; beside them each case. */
import type {
  CheckedJob,
  DeviceFaultRow,
  FaultCurrent,
  FaultMethod,
  FaultStudy,
  FaultSummary,
  JunctionFault,
  JunctionFaultRow,
} from '../../core/api.ts';

/** The cases that `faultlevel` studied by one method, and what they come to together. */
export interface FaultLevels {
  readonly job: CheckedJob;
  readonly method: FaultMethod;
  readonly studies: readonly FaultStudy[];
  readonly summary: FaultSummary;
}

export function faultLevelAnswer({ method, studies, summary }: FaultLevels): unknown {
  return {
    method,
    junctions: summary.poles.map(junctionAnswer),
    earth: summary.earth.map(junctionAnswer),
    devices: summary.devices.map(deviceAnswer),
    cases: studies.map(({ case: id, junctions, devices }) => ({
      case: id,
      junctions: junctions.map(faultAnswer),
      devices,
    })),
    assumed: [...new Set(studies.flatMap(({ assumed }) => assumed))],
  };
}

function junctionAnswer({ junction, to, highest, lowest, samePole }: JunctionFaultRow): unknown {
  return {
    junction,
    to,
    prospectiveMaxA: highest?.current.firstA ?? null,
    prospectiveMinA: lowest?.current.settledA ?? null,
    sourceResistanceOhm: highest?.current.sourceOhm ?? null,
    settledMaxA: highest?.current.settledA ?? null,
    openV: highest?.current.openV ?? null,
    maxCase: highest?.case ?? null,
    minCase: lowest?.case ?? null,
    samePole,
    shares: highest?.current.shares ?? [],
  };
}

function deviceAnswer({ id, interruptA, ok, fault, clearing }: DeviceFaultRow): unknown {
  return {
    id,
    maxA: fault?.highestA ?? null,
    interruptA,
    ok,
    clearS: clearing?.clearS ?? null,
    clears: clearing?.clears ?? null,
    clearing: clearing?.text ?? null,
    maxAt: fault?.at ?? null,
    minA: fault?.lowestA ?? null,
    minAt: fault?.lowestAt ?? null,
    minTo: fault?.lowestTo ?? null,
    fromBothSides: fault?.fromBothSides ?? false,
    sides: fault?.sides ?? [],
  };
}

function faultAnswer({ junction, to, highest, lowest }: JunctionFault): unknown {
  const figures = (current: FaultCurrent | null) =>
    current === null ? null : { firstA: current.firstA, settledA: current.settledA, openV: current.openV };
  return { junction, to, highest: figures(highest), lowest: figures(lowest) };
}
