/** Which pole of a system is earthed, read from the bonds to `earth`, and which pole therefore wants the devices. */
import type { JunctionId } from '../job/part.ts';
import type { CheckContext } from './checkContext.ts';

/** Junction that bonds to earth end on. */
export const EARTH = 'earth' as JunctionId;

interface PolePair {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}

/** True for a junction that wiring joins to earth, every device and switch taken as closed. */
export function isEarthed({ nets }: CheckContext, junction: JunctionId): boolean {
  return nets.same(junction, EARTH);
}

/** The pole that is not earthed: plus, but in a system with its plus earthed minus. Where none is earthed, plus. */
export function livePole(context: CheckContext, { plus, minus }: PolePair): 'plus' | 'minus' {
  return isEarthed(context, plus) && !isEarthed(context, minus) ? 'minus' : 'plus';
}
