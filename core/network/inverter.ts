/** What an inverter draws from the bank. */
import type { InverterPart } from '../job/part.ts';

/** Efficiency where the label says nothing; common practice. */
const DEFAULT_INVERTER_EFFICIENCY = 0.9;

/**
 * DC power for an AC output: P_dc = P_ac / efficiency, never below the standby draw; standby alone with no output. A list of
 * `[fraction of rated, efficiency]` points is interpolated linearly and held at its ends.
 */
export function inverterDcPowerW(inverter: InverterPart, acPowerW: number): { powerW: number; efficiency: number } {
  const standbyW = inverter.standbyW ?? 0;
  const efficiency = efficiencyAt(inverter, acPowerW / inverter.ratedW);
  if (acPowerW <= 0) return { powerW: standbyW, efficiency };
  return { powerW: Math.max(acPowerW / efficiency, standbyW), efficiency };
}

function efficiencyAt(inverter: InverterPart, fraction: number): number {
  const { efficiency } = inverter;
  if (efficiency === undefined) return DEFAULT_INVERTER_EFFICIENCY;
  if (typeof efficiency === 'number') return efficiency;
  let [lowFraction, lowEfficiency] = efficiency[0]!;
  if (fraction <= lowFraction) return lowEfficiency;
  for (const [highFraction, highEfficiency] of efficiency) {
    if (fraction <= highFraction) {
      const share = (fraction - lowFraction) / (highFraction - lowFraction);
      return lowEfficiency + share * (highEfficiency - lowEfficiency);
    }
    [lowFraction, lowEfficiency] = [highFraction, highEfficiency];
  }
  return lowEfficiency;
}
