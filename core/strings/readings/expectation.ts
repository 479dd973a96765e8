/** What the job's own model expects where something was read. */
import { stringSource } from '../../battery/stringSource.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { JunctionId, PartId, StringPart } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { ambientOf } from '../../network/circuit.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import type { Tables } from '../../tables/tables.ts';
import type { ReadState } from './readStates.ts';

export interface ExpectedSource {
  readonly ohm: number;
  readonly emfV: number;
}

interface Between {
  /** In series; one for most. */
  readonly strings: readonly PartId[];
  readonly states: readonly [ReadState, ReadState];
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}

/** Solved currents nearer than this part of the larger are one current. */
const sameCurrent = 1e-3;

/** Solves the cases that were read, each once, and only when asked. */
export class Expectation {
  private readonly job: CheckedJob;
  private readonly tables: Tables;
  private readonly solved = new Map<string, OperatingPoint>();

  constructor(request: {
    readonly job: CheckedJob;
    readonly tables: Tables;
    readonly points?: readonly OperatingPoint[];
  }) {
    this.job = request.job;
    this.tables = request.tables;
    for (const point of request.points ?? []) if (point.model === 'slow') this.solved.set(point.case, point);
  }

  point({ operatingCase }: Pick<ReadState, 'operatingCase'>): OperatingPoint {
    let point = this.solved.get(operatingCase.id);
    if (point === undefined) {
      point = operatingPoint({ job: this.job, operatingCase, tables: this.tables, model: 'slow' });
      this.solved.set(operatingCase.id, point);
    }
    return point;
  }

  /** Volts solved between two junctions in a state. */
  volts(state: ReadState, plus: JunctionId, minus: JunctionId): number | null {
    const { junctions } = this.point(state);
    const [high, low] = [junctions.get(plus), junctions.get(minus)];
    return typeof high === 'number' && typeof low === 'number' ? high - low : null;
  }

  amps(state: ReadState, part: PartId): number | null {
    return this.point(state).parts.get(part)?.currentA ?? null;
  }

  /**
   * EMF and resistance between two points, as two readings there would give them: from the difference of the solved points of
   * the same two cases; where the string's EMF is not the same in both, from its EMF and the solved point of the heavier case;
   * where the cases do not tell (no answer, no change of current), of the string and its links alone.
   */
  between({ strings, states, plus, minus }: Between): ExpectedSource {
    const own = states.map((state) => this.ownSource(state, strings));
    const [a, b] = states.map((state) => ({
      voltsV: this.volts(state, plus, minus),
      currentA: this.amps(state, strings[0]!),
    }));
    if (a === undefined || b === undefined) return own[0]!;
    if (a.voltsV === null || b.voltsV === null || a.currentA === null || b.currentA === null) return own[0]!;
    const changeA = b.currentA - a.currentA;
    if (Math.abs(changeA) <= sameCurrent * Math.max(Math.abs(a.currentA), Math.abs(b.currentA))) return own[0]!;
    if (own[0]!.emfV === own[1]!.emfV) {
      const ohm = (a.voltsV - b.voltsV) / changeA;
      return { ohm, emfV: a.voltsV + ohm * a.currentA };
    }
    const heavier = Math.abs(a.currentA) > Math.abs(b.currentA) ? 0 : 1;
    const { voltsV, currentA } = [a, b][heavier]!;
    const { emfV } = own[heavier]!;
    return { ohm: (emfV - voltsV!) / currentA!, emfV };
  }

  private ownSource({ operatingCase, parts }: ReadState, strings: readonly PartId[]): ExpectedSource {
    const ambientDegC = ambientOf(this.job, operatingCase);
    let [ohm, sumV] = [0, 0];
    for (const part of parts) {
      if (part.kind !== 'string' || !strings.includes(part.id)) continue;
      const { emfV, resistanceOhm } = sourceOf(part, ambientDegC, this.tables);
      ohm += resistanceOhm + part.linkOhm;
      sumV += emfV;
    }
    return { ohm, emfV: sumV };
  }
}

function sourceOf(string: StringPart, ambientDegC: number, tables: Tables) {
  const { emfV, resistanceOhm } = stringSource(string, { model: 'slow', ambientDegC, tables: tables.chemistry });
  return { emfV: emfV.value, resistanceOhm: resistanceOhm.value };
}
