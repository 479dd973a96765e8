/** What proposals cost, to compare them: metres times square millimetres of copper, and devices. */

/**
 * Metres times square millimetres that a device with its holder counts as, and one that is only swapped. Common practice, no source:
 * a guess at what the two cost beside copper, good enough to tell a fuse from ten metres of battery cable.
 */
export const NEW_DEVICE_COPPER = 40;
export const SWAPPED_DEVICE_COPPER = 10;

export interface ProtectionCost {
  /** Metres times square millimetres of new cable. */
  readonly copperMmm2: number;
  readonly newDevices: number;
  readonly swappedDevices: number;
}

export const NO_COST: ProtectionCost = { copperMmm2: 0, newDevices: 0, swappedDevices: 0 };

export function costSum(costs: readonly ProtectionCost[]): ProtectionCost {
  return costs.reduce(
    (sum, one) => ({
      copperMmm2: sum.copperMmm2 + one.copperMmm2,
      newDevices: sum.newDevices + one.newDevices,
      swappedDevices: sum.swappedDevices + one.swappedDevices,
    }),
    NO_COST,
  );
}

/** One figure to compare by, in metres times square millimetres. */
export function weightOf({ copperMmm2, newDevices, swappedDevices }: ProtectionCost): number {
  return copperMmm2 + newDevices * NEW_DEVICE_COPPER + swappedDevices * SWAPPED_DEVICE_COPPER;
}

export function costWords({ copperMmm2, newDevices, swappedDevices }: ProtectionCost): string {
  const words = [
    ...(copperMmm2 > 0 ? [`${Math.round(copperMmm2)} m·mm² of cable`] : []),
    ...counted(newDevices, 'new device'),
    ...counted(swappedDevices, 'device of another rating'),
  ];
  return words.length === 0 ? 'nothing' : words.join(', ');
}

function counted(count: number, what: string): readonly string[] {
  return count === 0 ? [] : [`${count} ${count === 1 ? what : what.replace('device', 'devices')}`];
}
