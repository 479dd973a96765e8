/** Takes out what refers to parts, fields and junctions that are gone, so that the job can still be read. */
import { partFields } from '../job/partFields.ts';
import type { OpenCase, OpenDraft, OpenPart } from './draft.ts';
import { derivedIds, junctionNamesOf } from './naming.ts';

/**
 * Removes from cases what is set on parts or fields that are no more, from readings those of lost parts or junctions, and the
 * notes on junctions that nothing touches. `x-…` entries stay.
 */
export function dropDangling(open: OpenDraft): void {
  const byId = new Map(open.parts.map((part) => [part.id, part]));
  for (const operatingCase of open.cases ?? []) tidyCase(operatingCase, byId);
  const measurable = new Set(open.parts.flatMap(({ id, kind }) => (kind === 'pair' ? derivedIds(id) : [id])));
  const junctions = junctionNamesOf(open);
  tidyNotes(open, junctions);
  const readings = open.readings;
  if (readings === undefined) return;
  const kept = readings.filter(({ part, plus, minus }) => {
    if (part !== undefined) return measurable.has(part);
    return plus !== undefined && minus !== undefined && plus !== minus && junctions.has(plus) && junctions.has(minus);
  });
  if (kept.length < readings.length) open.readings = kept;
}

function tidyNotes(open: OpenDraft, junctions: ReadonlySet<string>): void {
  const notes = open.junctions;
  if (notes === undefined) return;
  for (const name of Object.keys(notes)) {
    if (!junctions.has(name) && !name.startsWith('x-')) delete notes[name];
  }
  if (Object.keys(notes).length === 0) delete open.junctions;
}

function tidyCase(operatingCase: OpenCase, byId: ReadonlyMap<string, OpenPart>): void {
  const { surge, set, stateOfChargeByString: charges } = operatingCase;
  const surging = surge === undefined ? undefined : byId.get(surge)?.kind;
  if (surge !== undefined && surging !== 'load' && surging !== 'inverter') delete operatingCase.surge;
  for (const id of Object.keys(charges ?? {})) {
    if (byId.get(id)?.kind !== 'string' && !id.startsWith('x-')) delete charges?.[id];
  }
  for (const id of Object.keys(set ?? {})) {
    if (!id.startsWith('x-')) tidySet(set ?? {}, id, byId.get(id)?.kind);
  }
  dropEmpty(operatingCase, 'stateOfChargeByString');
  dropEmpty(operatingCase, 'set');
}

const common: ReadonlySet<string> = new Set(['label', 'note', 'locationTag', 'at', 'origin', 'range']);

function tidySet(set: Record<string, Record<string, unknown>>, id: string, kind: string | undefined): void {
  const fields = kind === undefined ? undefined : partFields.get(kind);
  const settings = set[id];
  if (fields === undefined || settings === undefined) {
    delete set[id];
    return;
  }
  for (const name of Object.keys(settings)) {
    if (!Object.hasOwn(fields, name) && !common.has(name) && !name.startsWith('x-')) delete settings[name];
  }
  if (Object.keys(settings).length === 0) delete set[id];
}

function dropEmpty(operatingCase: OpenCase, field: 'set' | 'stateOfChargeByString'): void {
  const record = operatingCase[field];
  if (record !== undefined && Object.keys(record).length === 0) delete operatingCase[field];
}
