/** Which source feeds a load, and by which way. */

import type { OperatingPoint } from '../network/answer.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { LoadPort, SourcePort } from './walkPorts.ts';
import { sourcePorts } from './walkPorts.ts';
import type { Stretch, Wires } from './wires.ts';

export interface Route {
  readonly source: SourcePort;
  readonly load: LoadPort;
  readonly out: readonly Stretch[];
  readonly back: readonly Stretch[];
  /** The least current on the way, in its direction, source and load included; below 0 where some of it flows against the walk. */
  readonly leastA: number;
}

/** The routes from every source that reaches the load, the one that feeds it most first. */
export function routesTo(
  load: LoadPort,
  {
    parts,
    wires,
    point,
  }: { readonly parts: readonly SinglePart[]; readonly wires: Wires; readonly point: OperatingPoint },
): readonly Route[] {
  const routes = parts.flatMap((part) => {
    const route = part.id === load.part ? undefined : routeFrom(sourcePorts(part, point), load, wires);
    return route === undefined ? [] : [route];
  });
  const givenA = ({ source }: Route) => source.currentA ?? 0;
  // Ties in the least current are the rule (the load's own): then the stronger source, then the shorter way.
  routes.sort(
    (a, b) =>
      b.leastA - a.leastA || givenA(b) - givenA(a) || a.out.length + a.back.length - b.out.length - b.back.length,
  );
  return routes;
}

/** The route from the first of a source's ports that reaches the load at both its poles. */
export function routeFrom(ports: readonly SourcePort[], load: LoadPort, wires: Wires): Route | undefined {
  for (const plain of [true, false]) {
    for (const source of ports) {
      const out = wires.way(source.plus, load.plus);
      const back = wires.way(load.minus, source.minus);
      if (out === undefined || back === undefined) continue;
      const stretches = [...out, ...back];
      const strings = stretches.filter(({ wire }) => wire.emfV !== undefined);
      if (plain && strings.length > 0) continue;
      // A walk that falls through a string, unless that is being charged on the way, or meets its own source or load is no feed.
      if (strings.some((stretch) => !stretch.forward && (alongA(stretch) ?? 0) <= 0)) continue;
      if (stretches.some(({ wire }) => wire.part === source.part || wire.part === load.part)) continue;
      return { source, load, out, back, leastA: leastOf([source.currentA, load.currentA, ...stretches.map(alongA)]) };
    }
  }
  return undefined;
}

/** Current in the direction of the walk; null where not determined. */
export function alongA({ wire, forward }: Stretch): number | null {
  if (wire.currentA === null || forward) return wire.currentA;
  return wire.currentA === 0 ? 0 : -wire.currentA;
}

function leastOf(currents: readonly (number | null)[]): number {
  return currents.reduce<number>((least, a) => (a === null ? least : Math.min(least, a)), Number.POSITIVE_INFINITY);
}
