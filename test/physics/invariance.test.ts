/** What must not matter: names, the order of parts, which end of a wire is called `from`, where a cable is counted in two. */
import { describe, expect, it } from 'vitest';
import { type OperatingPoint, partsInCase } from '../../core/api.ts';
import { screen } from './denseScreening.ts';
import type { JobValue, PartValue } from './jobDraft.ts';
import { randomJob, renameJunctions, seeds } from './randomJob.ts';
import { seededRandom } from './seededRandom.ts';
import { type Answered, answered } from './solveValue.ts';

/** Of the largest volts or amps of the network: rounding in another order, no more. */
const TOLERANCE = 1e-9;
/** Amps through a tenth of a milliohm feel the last digit of 50 V at 1e-10 A. */
const AMPS_TOLERANCE = 1e-8;

interface Compared {
  readonly before: Answered;
  readonly after: OperatingPoint;
  /** The name after the change of a junction before it. */
  readonly junction?: (name: string) => string;
  /** The sign of a part's current after the change. */
  readonly sign?: (id: string) => 1 | -1;
}

/** Junctions whose volts have moved against the first junction of their group: which junction is 0 V may change. */
function movedVolts({ before, after, junction = (name) => name }: Compared): readonly string[] {
  const { point, job, operatingCase } = before;
  const { group } = screen(partsInCase(job, operatingCase), operatingCase);
  const volts = new Map<string, number | null>(after.junctions);
  const scaleV = Math.max(1, ...[...point.junctions.values()].map((value) => Math.abs(value ?? 0)));
  const shifts = new Map<string, number>();
  return [...point.junctions].flatMap(([name, value]) => {
    const now = volts.get(junction(name)) ?? null;
    if (value === null || now === null) return value === now ? [] : [`${name}: ${value} V became ${now} V`];
    const shift = shifts.get(group(name)) ?? now - value;
    shifts.set(group(name), shift);
    return Math.abs(now - shift - value) <= TOLERANCE * scaleV ? [] : [`${name}: ${value} V became ${now - shift} V`];
  });
}

/** What has changed between two answers beyond what was meant to. */
function differences(compared: Compared): readonly string[] {
  const { before, after, sign = () => 1 } = compared;
  const { point } = before;
  if (point.outcome !== after.outcome) return [`${point.outcome} became ${after.outcome}`];
  const scaleA = Math.max(1, ...[...point.parts.values()].map(({ currentA }) => Math.abs(currentA ?? 0)));
  const changed = [...point.parts.values()].flatMap(({ id, currentA }) => {
    const now = after.parts.get(id)?.currentA;
    if (now === undefined) return [];
    const same =
      currentA === null || now === null
        ? currentA === now
        : Math.abs(sign(id) * now - currentA) <= AMPS_TOLERANCE * scaleA;
    return same ? [] : [`${id}: ${currentA} A became ${now} A`];
  });
  return [...movedVolts(compared), ...changed];
}

const JOBS = seeds({ first: 1001, count: 60 }).map((seed) => ({ seed, partCount: 6 + (seed % 15) }));

function overAllJobs(
  change: (value: JobValue, seed: number) => Omit<Compared, 'before' | 'after'> & { readonly value: JobValue },
): readonly string[] {
  return JOBS.flatMap((options) => {
    const value = randomJob(options);
    const { value: other, ...how } = change(value, options.seed);
    const found = differences({ before: answered(value), after: answered(other).point, ...how });
    return found.map((text) => `seed ${options.seed}: ${text}`);
  });
}

describe('what must not matter', () => {
  it('names of junctions change no volts and no amps', () => {
    const found = overAllJobs((value, seed) => {
      const fresh = new Map<string, string>();
      const random = seededRandom(seed);
      const junction = (name: string): string => {
        const known = fresh.get(name) ?? `${random.pick(['a', 'z', 'M'])}${random.whole([0, 9])}-${fresh.size}`;
        fresh.set(name, known);
        return known;
      };
      const parts = value.parts.map((part) => renameJunctions(part, junction));
      return { value: { ...value, parts }, junction };
    });
    expect(found).toEqual([]);
  });

  it('the order of parts changes no volts and no amps', () => {
    const found = overAllJobs((value, seed) => ({
      value: { ...value, parts: seededRandom(seed).shuffled(value.parts) },
    }));
    expect(found).toEqual([]);
  });

  it('a two-ended part the other way round changes the sign of its own current and nothing else', () => {
    const found = overAllJobs((value) => {
      const turned = new Set<string>();
      const parts = value.parts.map((part): PartValue => {
        if (typeof part['from'] !== 'string' || part.kind === 'diode') return part;
        turned.add(part.id);
        return { ...part, from: part['to'], to: part['from'] };
      });
      return { value: { ...value, parts }, sign: (id) => (turned.has(id) ? -1 : 1) };
    });
    expect(found).toEqual([]);
  });

  it('a cable counted as two of half the length and half the resistance changes nothing else', () => {
    const found = overAllJobs((value) => ({ value: { ...value, parts: value.parts.flatMap(inTwo) } }));
    expect(found).toEqual([]);
  });

  it('a cable by its size, warmed by its own current, may be counted as two of half the length', () => {
    const found = seeds({ first: 2001, count: 30 }).flatMap((seed) => {
      const value = randomJob({ seed, partCount: 8 + (seed % 12), sized: true });
      const halved = { ...value, parts: value.parts.flatMap(inTwo) };
      return differences({ before: answered(value), after: answered(halved).point });
    });
    expect(found).toEqual([]);
  });

  it('a load of no power, a switched-off load and a wire to nowhere change nothing', () => {
    const found = overAllJobs((value) => {
      const at = value.parts.find(({ kind }) => kind === 'load' || kind === 'string')!;
      const { plus, minus } = at as PartValue & { plus: string; minus: string };
      const idle: PartValue[] = [
        { id: 'idle amps', kind: 'load', plus, minus, currentA: 0 },
        { id: 'idle watts', kind: 'load', plus, minus, powerW: 0 },
        { id: 'idle off', kind: 'load', plus, minus, powerW: 500, on: false },
        { id: 'idle wire', kind: 'joint', from: plus, to: 'nowhere', resistanceOhm: 0.01 },
      ];
      return { value: { ...value, parts: [...value.parts, ...idle] } };
    });
    expect(found).toEqual([]);
  });
});

/** The first half keeps the cable's name, so that its current can be compared. */
function inTwo(part: PartValue): readonly PartValue[] {
  if (part.kind !== 'cable') return [part];
  const halved = Object.fromEntries(
    ['lengthM', 'resistanceOhm', 'endOhm']
      .filter((field) => part[field] !== undefined)
      .map((field) => [field, Number(part[field]) / 2]),
  );
  const middle = `middle of ${part.id}`;
  return [
    { ...part, ...halved, to: middle },
    { ...part, ...halved, id: `${part.id} second`, from: middle },
  ];
}
