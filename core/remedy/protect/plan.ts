/** The job while proposals are found: a copy with every change so far, judged anew after each. */
import { CheckContext } from '../../checks/checkContext.ts';
import { areaOf } from '../../conductor/size.ts';
import type { Draft } from '../../draft/draft.ts';
import { applyEdit, type Edit, together } from '../../draft/edit.ts';
import { setField } from '../../draft/fields.ts';
import { type CheckedJob, withPractice } from '../../job/job.ts';
import type { ConductorSize, PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import type { Tables } from '../../tables/tables.ts';
import { sizeText } from '../../units/conductorSize.ts';
import { type Conductor, conductorOf } from '../cableLadders.ts';
import { withKeptParts } from '../keptParts.ts';

/** Why something is changed, in one sentence with figures. */
export type Why = string;

export interface SizeChange {
  readonly conductor: Conductor;
  readonly from: ConductorSize;
  readonly to: ConductorSize;
  readonly why: readonly Why[];
}
export interface RatingChange {
  readonly device: PartId;
  readonly kind: string;
  readonly fromA: number;
  readonly toA: number;
}
export interface NewDevice {
  readonly device: PartId;
  /** Puts it in, with its rating. */
  readonly put: Edit;
  /** Which end, how far. */
  readonly place: string;
  readonly why: Why;
  readonly ratingA: number;
  /** The cable or source that it is put in for. */
  readonly near: PartId;
}
/** What a device to be bought has to be: the class, and what that class usually bears. */
export interface DeviceClass {
  readonly type: string;
  readonly ratingV: number;
  readonly interruptA: number;
}
/** What was looked at for a run and not taken. */
export interface Rejected {
  readonly part: PartId;
  readonly words: string;
  readonly why: Why;
}

export class Plan {
  readonly tables: Tables;
  draft: Draft;
  job: CheckedJob;
  context: CheckContext;
  readonly sizes = new Map<string, SizeChange>();
  readonly ratings = new Map<PartId, RatingChange>();
  readonly fresh: NewDevice[] = [];
  readonly classes = new Map<PartId, DeviceClass>();
  readonly rejected: Rejected[] = [];
  /** Parts that are to stay as they are. */
  private readonly frozen: ReadonlySet<PartId>;

  constructor(start: {
    readonly draft: Draft;
    readonly job: CheckedJob;
    readonly tables: Tables;
    readonly points?: readonly OperatingPoint[] | undefined;
    readonly frozen?: ReadonlySet<PartId>;
  }) {
    const { draft, job, tables, points = [], frozen = new Set<PartId>() } = start;
    this.frozen = frozen;
    this.draft = draft;
    this.job = job;
    this.tables = tables;
    this.context = new CheckContext({ job, tables, points });
  }

  /** Gives conductors other sizes. False where the job would not be readable afterwards: then nothing is changed. */
  resize(asked: readonly { readonly conductor: Conductor; readonly to: ConductorSize; readonly why: Why }[]): boolean {
    const changes = asked.filter(({ conductor }) => !this.frozen.has(conductor.part));
    if (changes.length === 0 || !this.take(changes.map(sizeEdit))) return false;
    for (const { conductor, to, why } of changes) {
      const key = `${conductor.part} ${conductor.field}`;
      const before = this.sizes.get(key);
      this.sizes.set(key, {
        conductor: before?.conductor ?? conductor,
        from: before?.from ?? conductor.size,
        to,
        why: [...(before?.why ?? []), why],
      });
    }
    return true;
  }

  rerate(device: { readonly id: PartId; readonly kind: string; readonly ratingA: number }, toA: number): boolean {
    if (this.frozen.has(device.id)) return false;
    if (!this.take([setField({ part: device.id, field: 'ratingA', value: toA })], 'same answers')) return false;
    const own = this.fresh.findIndex((one) => one.device === device.id);
    if (own >= 0) this.fresh[own] = { ...this.fresh[own]!, ratingA: toA };
    else {
      const fromA = this.ratings.get(device.id)?.fromA ?? device.ratingA;
      this.ratings.set(device.id, { device: device.id, kind: device.kind, fromA, toA });
    }
    return true;
  }

  put(added: NewDevice): boolean {
    if (this.frozen.has(added.near) || !this.take([added.put])) return false;
    this.fresh.push(added);
    return true;
  }

  /** States of what class a device is to be. */
  classify(device: PartId, what: DeviceClass): boolean {
    if (this.frozen.has(device) || !this.take([classEdit(device, what)], 'same answers')) return false;
    this.classes.set(device, what);
    return true;
  }

  reject(rejected: Rejected): void {
    const isKnown = this.rejected.some(({ part, words }) => part === rejected.part && words === rejected.words);
    if (!isKnown) this.rejected.push(rejected);
  }

  conductor(id: PartId): Conductor | undefined {
    return conductorOf({ job: this.job }, id);
  }

  /** Metres times square millimetres of a conductor of a size. */
  copper({ metres, inParallel }: Conductor, size: ConductorSize): number {
    const area = areaOf(size, this.tables.conductors);
    return 'missing' in area ? Number.POSITIVE_INFINITY : metres * inParallel * area.value;
  }

  private take(edits: readonly Edit[], answers?: 'same answers'): boolean {
    const edited = applyEdit(this.draft, together('', edits), this.tables);
    if (!edited.ok || edited.value.draft === this.draft) return false;
    const after = withKeptParts({ draft: this.draft, job: this.job }, edited.value);
    const { practice } = this.job;
    const job = after.practice === practice ? after : withPractice(after, practice);
    const points = answers === undefined ? [] : this.context.cases.map(({ point }) => point);
    this.draft = edited.value.draft;
    this.job = job;
    this.context = new CheckContext({ job, tables: this.tables, points });
    return true;
  }
}

/** Gives a conductor another size; a resistance measured on the old one goes with it. */
export function sizeEdit({ conductor, to }: { readonly conductor: Conductor; readonly to: ConductorSize }): Edit {
  const { part, field, isMeasured } = conductor;
  return together('', [
    setField({ part, field, value: sizeText(to) }),
    ...(isMeasured ? [setField({ part, field: 'resistanceOhm', value: undefined })] : []),
  ]);
}

/** States class, volts and interrupt rating of a device to be bought, as guesses until the maker's figures are there. */
export function classEdit(part: PartId, { type, ratingV, interruptA }: DeviceClass): Edit {
  return together('', [
    setField({ part, field: 'type', value: type }),
    setField({ part, field: 'ratingV', value: ratingV, origin: 'guess' }),
    setField({ part, field: 'interruptA', value: interruptA, origin: 'guess' }),
  ]);
}
