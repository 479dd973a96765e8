/** Where the window was when it was last closed, so that it comes back there; a place that no screen shows any more is forgotten. */
import { readFileSync, renameSync, writeFileSync } from 'node:fs';

export interface Bounds {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export interface WindowPlace {
  /** Undefined where the system may choose. */
  readonly bounds: Bounds | undefined;
  readonly maximized: boolean;
}

/** In screen pixels; below these the stages no longer fit beside the spine. */
export const smallest = { width: 900, height: 600 };
export const usual = { width: 1280, height: 800 };
/** How much of the window must lie on a screen, px both ways, for a hand to be able to reach its title. */
const reachable = 100;

/** `screens` are the areas of the screens that are there now. A file that is missing or makes no sense counts as none. */
export function readPlace(file: string, screens: readonly Bounds[]): WindowPlace {
  const kept = keptPlace(file);
  if (kept === undefined) return { bounds: undefined, maximized: false };
  const bounds = screens.some((screen) => isReachable(kept.bounds, screen)) ? kept.bounds : undefined;
  return { bounds, maximized: kept.maximized };
}

/** Kept whole or not at all. Losing it loses nothing but a place on the screen, so trouble with the disk is not told. */
export function keepPlace(file: string, place: { readonly bounds: Bounds; readonly maximized: boolean }): void {
  try {
    writeFileSync(`${file}.part`, JSON.stringify(place));
    renameSync(`${file}.part`, file);
  } catch {
    // The store tells of a full or locked disk where it matters.
  }
}

function keptPlace(file: string): { bounds: Bounds; maximized: boolean } | undefined {
  try {
    const kept = JSON.parse(readFileSync(file, 'utf8')) as { bounds?: Partial<Bounds>; maximized?: unknown };
    const { x, y, width, height } = kept.bounds ?? {};
    if (!isPixel(x) || !isPixel(y) || !isPixel(width) || !isPixel(height)) return undefined;
    const size = { width: Math.max(width, smallest.width), height: Math.max(height, smallest.height) };
    return { bounds: { x, y, ...size }, maximized: kept.maximized === true };
  } catch {
    return undefined;
  }
}

function isPixel(value: unknown): value is number {
  return Number.isInteger(value) && Math.abs(value as number) <= 100_000;
}

function isReachable(window: Bounds, screen: Bounds): boolean {
  const across = Math.min(window.x + window.width, screen.x + screen.width) - Math.max(window.x, screen.x);
  const below = screen.y + screen.height - window.y;
  return across >= reachable && below >= reachable && window.y >= screen.y;
}
