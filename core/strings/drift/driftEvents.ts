/** What is told of a drift run: each thing the first time it happens, with the number of later cycles in which it happens again. */
import type { PartId } from '../../job/part.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import type { DriftStudy } from '../answer.ts';

interface Told {
  readonly hours: number;
  readonly part: PartId | null;
  readonly text: string;
  readonly cycle: number;
  readonly later: Set<number>;
}

export class DriftEvents {
  private readonly told = new Map<string, Told>();
  cycle = 0;

  /** `text` says what happened; when is added. */
  tell(what: string, event: { readonly hours: number; readonly part: PartId | null; readonly text: string }): void {
    const key = `${what} ${event.part ?? ''}`;
    const known = this.told.get(key);
    if (known === undefined) this.told.set(key, { ...event, cycle: this.cycle, later: new Set() });
    else if (known.cycle !== this.cycle) known.later.add(this.cycle);
  }

  get list(): DriftStudy['events'] {
    return [...this.told.values()].map(({ hours, part, text, later }) => ({
      hours,
      part,
      text: `${text} at hour ${hourText(hours)}${again(later.size)}`,
    }));
  }
}

export function hourText(hours: number): string {
  return hours.toFixed(1);
}

export function ampsText(value: number): string {
  return formatQuantity({ value, unit: 'A', digits: 3 });
}

function again(cycles: number): string {
  if (cycles === 0) return '';
  return cycles === 1 ? ', and again in one later cycle' : `, and again in ${cycles} later cycles`;
}
