/** What the rules read: the job's cases, each solved once, the drawing as a graph, and further solves on demand. */

import { type Ampacity, ampacity } from '../conductor/ampacity.ts';
import type { Missing } from '../conductor/size.ts';
import { Defect } from '../job/issue.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { CablePart, JunctionId, Part, PartId } from '../job/part.ts';
import type { BatteryModel, OperatingPoint, PartAnswer } from '../network/answer.ts';
import { ambientOf } from '../network/circuit.ts';
import { operatingPoint } from '../network/operatingPoint.ts';
import { meetings, type Nets, netsOf, type PartEnd, type SinglePart, withoutPairs } from '../network/wiring.ts';
import { Memory } from '../tables/memory.ts';
import type { PracticeTable } from '../tables/practiceTable.ts';
import type { Tables } from '../tables/tables.ts';
import type { Judge } from './rule.ts';
import { SystemVolts } from './systemVolts.ts';
import { field } from './wording.ts';

/** One case with its answer. */
export class SolvedCase {
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
  /** As they stand in the case, an out-and-back run as its two cables. */
  readonly parts: readonly SinglePart[];
  readonly ambientDegC: number;
  private readonly byId: ReadonlyMap<PartId, SinglePart>;

  constructor(job: CheckedJob, operatingCase: OperatingCase, point: OperatingPoint) {
    this.operatingCase = operatingCase;
    this.point = point;
    this.parts = withoutPairs(partsInCase(job, operatingCase));
    this.ambientDegC = ambientOf(job, operatingCase);
    this.byId = new Map(this.parts.map((part) => [part.id, part]));
  }

  get id(): string {
    return this.operatingCase.id;
  }
  /** False where there is no operating point to judge: a collapse, no source, or an answer whose proof does not hold. */
  get isSolved(): boolean {
    return this.point.outcome === 'solved' && this.point.proof.holds;
  }
  /** True while a load or inverter starts up: its current lasts seconds, so what may warm up is not judged by it. */
  get isStarting(): boolean {
    return this.operatingCase.surge !== undefined;
  }

  part(id: PartId): SinglePart {
    const part = this.byId.get(id);
    if (part === undefined) throw new Defect(`every part of the job stands in every case (${id})`);
    return part;
  }
  answer(id: PartId): PartAnswer {
    const answer = this.point.parts.get(id);
    if (answer === undefined) throw new Defect(`an operating point answers every part (${id})`);
    return answer;
  }
}

export interface CheckRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  /** Else the job's own. */
  readonly cases?: readonly OperatingCase[];
  /** Battery model for every case; else `fast` for a case with a starting load and `slow` for the rest. */
  readonly model?: BatteryModel;
  /** Answers already known, found by the id of their case; the others are solved here. */
  readonly points?: readonly OperatingPoint[];
}

/** A cable as if it lay alone with its return in some air, outside an engine space. */
const aloneInAir = new Memory<CablePart, CablePart>();

export class CheckContext implements Judge {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly practice: PracticeTable;
  readonly cases: readonly SolvedCase[];
  /** Cases with a proved answer. */
  readonly solved: readonly SolvedCase[];
  /** Of those, the ones in which nothing is starting. */
  readonly steady: readonly SolvedCase[];
  /** The parts as drawn. */
  readonly drawn: readonly SinglePart[];
  /** Junctions joined by wiring, every switch, breaker and fuse taken as closed. */
  readonly nets: Nets;
  readonly meetings: ReadonlyMap<JunctionId, readonly PartEnd[]>;
  readonly volts: SystemVolts;
  private readonly ampacities = new WeakMap<CablePart, Map<number, Ampacity | Missing>>();

  constructor(request: CheckRequest) {
    const { job, tables } = request;
    this.job = job;
    this.tables = tables;
    this.practice = tables.practices[job.practice];
    const known = new Map((request.points ?? []).map((point) => [point.case, point]));
    this.cases = (request.cases ?? job.cases).map((operatingCase) => {
      const model = request.model ?? (operatingCase.surge === undefined ? 'slow' : 'fast');
      return new SolvedCase(job, operatingCase, known.get(operatingCase.id) ?? this.solve(operatingCase, model));
    });
    this.solved = this.cases.filter((one) => one.isSolved);
    this.steady = this.solved.filter((one) => !one.isStarting);
    this.drawn = withoutPairs(job.parts);
    this.nets = netsOf(this.drawn, () => true);
    this.meetings = meetings(this.drawn);
    const changed = this.cases.flatMap((one) => [...one.operatingCase.changed.values()]);
    this.volts = new SystemVolts({
      parts: this.drawn,
      everyState: [...this.drawn, ...withoutPairs(changed)],
      nets: this.nets,
      nominalV: job.settings.nominalV,
      site: job.site,
      solved: this.solved.map((one) => ({ id: one.id, junctions: one.point.junctions })),
    });
  }

  solve(operatingCase: OperatingCase, model: BatteryModel): OperatingPoint {
    return operatingPoint({ job: this.job, operatingCase, tables: this.tables, model });
  }

  /** A case with some of its parts changed further, solved with the same battery model. */
  solveChanged(base: SolvedCase, changes: readonly Part[], model: BatteryModel = base.point.model): OperatingPoint {
    if (changes.length === 0 && model === base.point.model) return base.point;
    const { operatingCase } = base;
    const changed = new Map(operatingCase.changed);
    for (const part of changes) changed.set(part.id, part);
    return this.solve({ ...operatingCase, changed }, model);
  }

  /** Ampacity of a cable in the air of a case; system volts by the net that it lies on. */
  ampacityOf(cable: CablePart, ambientDegC: number): Ampacity | Missing {
    let byAmbient = this.ampacities.get(cable);
    if (byAmbient === undefined) {
      byAmbient = new Map();
      this.ampacities.set(cable, byAmbient);
    }
    let found = byAmbient.get(ambientDegC);
    if (found === undefined) {
      found = this.namedAmpacity(cable, ampacity(cable, this.ampacityContext(cable, ambientDegC)));
      byAmbient.set(ambientDegC, found);
    }
    return found;
  }

  /**
   * The cable's ampacity before correction: in its table's own air, alone with its return, outside an engine space; the limit
   * of its terminals, where the practice has one, included.
   */
  uncorrectedAmpacityOf(cable: CablePart, corrected: Ampacity): Ampacity | Missing {
    const ambientDegC = corrected.tableAmbientDegC;
    const alone = aloneInAir.of(this.tables, cable, String(ambientDegC), (): CablePart => {
      const run = cable.run === 'engine-space' ? undefined : cable.run;
      return { ...cable, ambientDegC, loadedConductors: 2, run };
    });
    return this.namedAmpacity(cable, ampacity(alone, this.ampacityContext(cable, ambientDegC)));
  }

  /** What is missing, with the cable that it is missing of. */
  private namedAmpacity(cable: CablePart, answer: Ampacity | Missing): Ampacity | Missing {
    if (!('missing' in answer)) return answer;
    return { missing: cable.size === undefined ? field(cable, 'size') : `${answer.missing} (cable ${cable.id})` };
  }

  private ampacityContext(cable: CablePart, ambientDegC: number) {
    const { practice } = this.job;
    const systemV = this.volts.nominalAt(cable.from);
    return { practice, ambientDegC, tables: this.tables.conductors, systemV };
  }
}
