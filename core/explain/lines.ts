/** Puts the working of one part together line by line. */
import type { Part } from '../job/part.ts';
import { originOf } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import type { Basis } from '../tables/status.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { numberText } from '../units/numberText.ts';
import type { FigureOrigin, WorkingLine } from './workingLine.ts';

/** As many digits as a pocket calculator needs to come to the same answer; the answer itself is shown with fewer. */
const DIGITS = 6;

/** A figure with its unit, in the unit itself, so that it can be keyed in as it stands. */
export function figure(value: number | null | undefined, unit: string): string {
  if (value === null || value === undefined) return '?';
  if (unit === '1') return numberText({ value, digits: DIGITS });
  return formatQuantity({ value, unit, digits: DIGITS, prefix: false });
}

/** One summand or factor that may be negative, in brackets where it is. */
export function signed(value: number | null | undefined, unit: string): string {
  return typeof value === 'number' && value < 0 ? `(${figure(value, unit)})` : figure(value, unit);
}

export interface LineToWrite {
  readonly name: string;
  readonly formula: string;
  /** Without the result, which is put after it. */
  readonly values: string;
  readonly value: number | null;
  readonly unit: string;
  readonly answers?: WorkingLine['answers'];
  readonly origins?: readonly FigureOrigin[];
  readonly basis?: Basis;
  /** Why `value` is null. */
  readonly why?: string;
}

export class Lines {
  readonly list: WorkingLine[] = [];
  readonly answer: PartAnswer;
  private readonly part: Part;
  private readonly point: OperatingPoint;

  constructor(part: Part, answer: PartAnswer, point: OperatingPoint) {
    this.part = part;
    this.answer = answer;
    this.point = point;
  }

  add(line: LineToWrite): void {
    const { name, formula, values, unit, answers, origins = [], basis } = line;
    // What the network leaves open stays open, whatever a formula would give.
    const open = answers !== undefined && typeof this.answer[answers] !== 'number';
    const value = open || line.value === null || !Number.isFinite(line.value) ? null : line.value;
    this.list.push({
      name,
      formula,
      withValues: value === null ? values : `${values} = ${figure(value, unit)}`,
      result: { value: value === 0 ? 0 : value, unit },
      ...(answers === undefined ? {} : { answers }),
      origins,
      ...(basis === undefined ? {} : { basis }),
      ...(value === null ? { notDetermined: line.why ?? this.whyOpen() } : {}),
    });
  }

  /** A current that follows from the rest of the network. */
  networkCurrent(name = 'Current', answers: 'currentA' | 'inputA' | 'outputA' = 'currentA'): void {
    this.add({
      name,
      formula: 'ΣI = 0 at every junction, ΣV = 0 round every loop',
      values: 'I from the whole network',
      value: this.answer[answers] ?? null,
      unit: 'A',
      answers,
    });
  }

  /** Volts between two junctions as the solve gives them. */
  networkVolts(
    [plus, minus]: readonly [plus: string, minus: string],
    answers: 'voltageV' | 'inputV' | 'outputV' = 'voltageV',
    name = 'Volts',
  ): void {
    const at = (id: string) => this.point.junctions.get(id as Parameters<OperatingPoint['junctions']['get']>[0]);
    const [high, low] = [at(plus), at(minus)];
    const known = typeof high === 'number' && typeof low === 'number';
    this.add({
      name,
      formula: `V = V(${plus}) − V(${minus})`,
      values: known ? `${figure(high, 'V')} − ${signed(low, 'V')}` : 'V from the whole network',
      value: known ? high - low : (this.answer[answers] ?? null),
      unit: 'V',
      answers,
    });
  }

  /** Where a field's figure comes from. */
  origin(...fields: readonly string[]): readonly FigureOrigin[] {
    return fields.map((field) => {
      const range = this.part.range.get(field);
      const origin = originOf(this.part, field);
      return range === undefined ? { field, origin } : { field, origin, range };
    });
  }

  private whyOpen(): string {
    if (this.answer.undetermined !== undefined) return this.answer.undetermined;
    return 'the volts here are not defined: no closed path leads to a source';
  }
}

/** A product whose other factor is not known is still nothing where this one is. */
export function product(a: number | null, b: number | null): number | null {
  if (a === 0 || b === 0) return 0;
  return a === null || b === null ? null : a * b;
}
