/** The drawing of the open job: where everything stands and what is drawn for each part, with the hand's move on top. */
import { useMemo, useState } from 'react';
import type {
  CheckedJob,
  DrawnPart,
  JunctionId,
  LaidSurroundings,
  Part,
  PartId,
  Point,
  Positions,
} from '../../core/api.ts';
import {
  drawPart,
  EARTH,
  freeSide,
  junctionsOf,
  minusSide,
  moveBy,
  positionsOf,
  ratingWords,
  surroundingsOf,
} from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { type Drag, useView } from './view.ts';

/** A part as it is drawn. The object stays the same as long as nothing of it looks different. */
export interface PlacedPart {
  readonly key: string;
  readonly part: Part;
  readonly at: Point;
  readonly drawn: DrawnPart;
  /** Side of a device that is free for its words. */
  readonly side: 'left' | 'right';
  readonly rating: string;
  /** A bar of the minus pole: its name stands at its foot. */
  readonly isLow: boolean;
}
export interface PlacedJunction {
  readonly key: string;
  readonly id: JunctionId;
  readonly at: Point;
  readonly label: string;
  readonly isReference: boolean;
  /** Its figure stands under it: it is the minus of something. */
  readonly isLow: boolean;
  /** A pole of a device or a tap of a bar: told even when the drawing is small. */
  readonly isMain: boolean;
}
export interface Drawing {
  readonly job: CheckedJob;
  /** Without the hand's move. */
  readonly positions: Positions;
  readonly parts: readonly PlacedPart[];
  readonly junctions: readonly PlacedJunction[];
}

export function useDrawing(): Drawing {
  const job = useOpenJob((open) => open.job);
  const drag = useView((view) => view.drag);
  const [geometry] = useState(() => new Geometry());
  const positions = useMemo(() => geometry.positionsOf(job), [geometry, job]);
  const [parts] = useState(() => new Kept<PlacedPart>());
  const [junctions] = useState(() => new Kept<PlacedJunction>());
  return useMemo(() => {
    const shown = withDrag(job, positions, drag);
    const drawnOf = geometry.drawnOf(job, shown);
    return {
      job,
      positions,
      parts: parts.of(placeParts(job, shown, drawnOf), ({ part }) => part.id),
      junctions: junctions.of(placeJunctions(job, shown), ({ id }) => id),
    };
  }, [job, positions, drag, parts, junctions, geometry]);
}

/**
 * Places and lines depend on what touches what and where it was put, and on no figure: while a person types lengths and ratings they
 * are found once.
 */
class Geometry {
  private shape = '';
  private positions: Positions | null = null;
  private shown: Positions | null = null;
  private around: LaidSurroundings | undefined;
  private drawn: ReadonlyMap<PartId, DrawnPart> = new Map();

  positionsOf(job: CheckedJob): Positions {
    const shape = shapeOf(job);
    if (this.positions === null || shape !== this.shape) {
      this.shape = shape;
      this.positions = positionsOf(job);
    }
    return this.positions;
  }

  /** The same places in the same shape give the same lines. */
  drawnOf(job: CheckedJob, shown: Positions): ReadonlyMap<PartId, DrawnPart> {
    if (this.shown !== shown) {
      this.shown = shown;
      const around = surroundingsOf(job.parts, shown, this.around);
      this.around = around;
      this.drawn = new Map(
        job.parts.flatMap((part) => {
          const at = shown.parts.get(part.id);
          return at === undefined ? [] : [[part.id, drawPart(part, at, around)] as const];
        }),
      );
    }
    return this.drawn;
  }
}

/** All that places and lines depend on. */
function shapeOf(job: CheckedJob): string {
  const parts = job.parts.map((part) => [
    part.id,
    part.kind,
    part.at,
    'state' in part ? part.state : null,
    ...junctionsOf(part),
  ]);
  return JSON.stringify([parts, [...job.junctions].map(([id, { at }]) => [id, at])]);
}

/** Gives back the objects of the last time wherever nothing of them has changed. */
class Kept<T extends { readonly key: string }> {
  private last = new Map<string, T>();

  of(now: readonly T[], idOf: (one: T) => string): readonly T[] {
    const kept = now.map((one) => {
      const old = this.last.get(idOf(one));
      return old?.key === one.key ? old : one;
    });
    this.last = new Map(kept.map((one) => [idOf(one), one]));
    return kept;
  }
}

export function withDrag(job: CheckedJob, positions: Positions, drag: Drag | null): Positions {
  if (drag === null) return positions;
  const moved = moveBy(job.parts, { ...drag, positions });
  return {
    parts: new Map([...positions.parts, ...moved.parts]),
    junctions: new Map([...positions.junctions, ...moved.junctions]),
  };
}

function placeParts(
  job: CheckedJob,
  positions: Positions,
  drawnOf: ReadonlyMap<PartId, DrawnPart>,
): readonly PlacedPart[] {
  const far = farEnds(job);
  const low = minusSide(job);
  return job.parts.flatMap((part): readonly PlacedPart[] => {
    const [at, drawn] = [positions.parts.get(part.id), drawnOf.get(part.id)];
    if (at === undefined || drawn === undefined) return [];
    const rating = ratingWords(part);
    const side =
      'plus' in part
        ? freeSide(
            at,
            (far.get(part.id) ?? []).flatMap((id) => positions.parts.get(id) ?? []),
          )
        : 'right';
    const state = 'state' in part ? part.state : '';
    const isLow = part.kind === 'busbar' && part.junctions.some((each) => low.has(each));
    const key = JSON.stringify([part.kind, part.label, rating, state, at, side, isLow, looksOf(drawn)]);
    return [{ key, part, at, drawn, side, rating, isLow }];
  });
}

const looks = new WeakMap<DrawnPart, string>();
/** Two drawn parts look alike where these texts are the same. */
function looksOf(drawn: DrawnPart): string {
  let text = looks.get(drawn);
  if (text === undefined) {
    text = JSON.stringify(drawn);
    looks.set(drawn, text);
  }
  return text;
}

/** The parts that each device shares a junction with. */
function farEnds(job: CheckedJob): ReadonlyMap<PartId, readonly PartId[]> {
  const touching = new Map<JunctionId, PartId[]>();
  for (const part of job.parts) {
    for (const junction of junctionsOf(part)) touching.set(junction, [...(touching.get(junction) ?? []), part.id]);
  }
  return new Map(
    job.parts
      .filter((part) => 'plus' in part)
      .map((part) => [
        part.id,
        junctionsOf(part)
          .flatMap((each) => touching.get(each) ?? [])
          .filter((id) => id !== part.id),
      ]),
  );
}

function placeJunctions(job: CheckedJob, positions: Positions): readonly PlacedJunction[] {
  const low = minusSide(job);
  const main = new Set(job.parts.flatMap((part) => ('plus' in part ? [part.plus, part.minus] : [])));
  return [...positions.junctions].flatMap(([id, at]): readonly PlacedJunction[] => {
    if (id === EARTH) return [];
    const note = job.junctions.get(id);
    const label = note?.label ?? id;
    const isReference = note?.reference === true;
    const [isLow, isMain] = [low.has(id), main.has(id)];
    return [
      { key: JSON.stringify([at, label, isReference, isLow, isMain]), id, at, label, isReference, isLow, isMain },
    ];
  });
}
