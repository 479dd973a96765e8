/** A string of blocks as a source behind a resistance, for one model of the battery. */
import type { StringPart } from '../job/part.ts';
import type { ChemistryTables } from '../tables/chemistryTables.ts';
import type { Banded } from './banded.ts';

export interface StringSource {
  /** Whole string at rest, at its state of charge and temperature. */
  readonly emfV: Banded;
  /** Whole string, links excluded, for the model asked. */
  readonly resistanceOhm: Banded;
  /** What was assumed, one plain sentence each, beginning with the field that would settle it. */
  readonly assumed: readonly string[];
}

/** `slow`: minutes (sharing, drops); `fast`: the first second (faults, surges). */
export interface StringContext {
  readonly model: 'slow' | 'fast';
  readonly ambientDegC: number;
  readonly tables: ChemistryTables;
}

export declare function stringSource(string: StringPart, context: StringContext): StringSource;
