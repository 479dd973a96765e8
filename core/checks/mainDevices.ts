/** The devices next to a bank: those that a string reaches with no other device in between. */
import type { StringPart } from '../job/part.ts';
import { type Device, isDevice, netsOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';

export interface MainDevice {
  readonly device: Device;
  /** Strings that reach it with no other device in between. */
  readonly near: readonly StringPart[];
  /** All strings side by side with those. */
  readonly whole: readonly StringPart[];
}

export function mainDevices(context: Pick<CheckContext, 'drawn' | 'nets'>): readonly MainDevice[] {
  const strings = context.drawn.filter((part): part is StringPart => part.kind === 'string');
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  return context.drawn.flatMap((device): readonly MainDevice[] => {
    if (!isDevice(device)) return [];
    const nets = [bare.of(device.from), bare.of(device.to)];
    const near = strings.filter(({ plus, minus }) => [plus, minus].some((pole) => nets.includes(bare.of(pole))));
    // Side by side: poles on the same nets with everything closed. Strings in series with it give what it gives.
    const whole = strings.filter((string) =>
      near.some(({ plus, minus }) => context.nets.same(plus, string.plus) && context.nets.same(minus, string.minus)),
    );
    return near.length === 0 ? [] : [{ device, near, whole }];
  });
}
