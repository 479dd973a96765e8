/** A bank as drawn against every other way to wire the same blocks: ladder with taps anywhere, equal leads, halving tree. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import type { JunctionId, PartId } from '../../job/part.ts';
import type { BatteryModel } from '../../network/answer.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import { closedNets, polesOf, type SinglePart, withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { Layout, LayoutKind, LayoutStudy } from '../answer.ts';
import { type Bank, banksOf } from '../banks.ts';
import { type BankDraw, FactoredBank } from './bankNetwork.ts';
import { ladderOf, type RowShape, starOf, treeOf, type WiredRow } from './layoutNetworks.ts';
import { withLeads } from './leadLengths.ts';
import { cableMetres, deviationsOf, indexOfLargest, measureBank, type SolvedBank, sum } from './measure.ts';
import { POLES, rowOf } from './row.ts';
import { shapeOf } from './rowShape.ts';
import { type Taps, tapLayouts } from './tapLayouts.ts';

export interface LayoutsRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
  /** Middle to middle of neighbours in the row, m; else as drawn, else a usual one. */
  readonly spacingM?: number | undefined;
  /** One link of one bar; else as drawn, else of the strings' cable. */
  readonly linkOhm?: number | undefined;
  /** Each lead to the bars, m; else the longest as drawn, else half the row. */
  readonly leadM?: number | undefined;
  /** First strings of the branches where all chargers are tapped, apart from the loads. */
  readonly chargeTaps?: { readonly plus: PartId; readonly minus: PartId } | undefined;
  readonly progress?: (done: number, of: number) => void;
}

/** Layouts whose spreads differ by no more than this are equals. */
const EQUAL_SPREAD = 0.001;

/**
 * The bank with most branches in one case, wired in every way that leaves its blocks in their row, each branch named by its first
 * string. Strings keep their EMF, resistance and own devices; the current of the bank is that of the case, set at the taps. As drawn
 * is the job itself. Null where no bank has two branches, the case has no answer, or the bank carries less than C/50 in it.
 */
export function layoutsOf(request: LayoutsRequest): LayoutStudy | null {
  const solved = solveBank(request);
  const drawn = solved === null ? undefined : measuredLayout(solved, AS_DRAWN);
  if (solved === null || drawn === undefined) return null;
  const { progress } = request;
  const ids = solved.row.branches.map(({ branch }) => branch.strings[0]!.id);
  const bankA = sum(drawn.strings.map(({ currentA }) => currentA));
  const shape = shapeOf(solved, request);
  const row = new RowBench(solved, { ids, bankA, shape });
  const other = [...row.tapped(chargePlaces(ids, request.chargeTaps)), ...row.joined(request.leadM)];
  other.sort((a, b) => a.spread - b.spread);
  progress?.(1, 1);
  const layouts = [drawn, ...other];
  return {
    case: request.operatingCase.id,
    strings: ids,
    bankA,
    linkOhm: shape.linkOhm,
    spacingM: shape.spacingM,
    assumed: shape.assumed,
    layouts,
    best: bestOf(layouts.filter(({ chargePlusAt }) => chargePlusAt === null || request.chargeTaps !== undefined)).name,
  };
}

const AS_DRAWN = { name: 'as drawn', kind: 'as-drawn' } as const;

/** The bank with most branches as the case has it; null where there is none of two or more. */
export function solveBank({
  job,
  tables,
  operatingCase,
  model,
}: Pick<LayoutsRequest, 'job' | 'tables' | 'operatingCase' | 'model'>): SolvedBank | null {
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const bank = largestBank(parts);
  if (bank === undefined) return null;
  const point = operatingPoint({ job, tables, operatingCase, model });
  return { job, tables, operatingCase, row: rowOf(bank, parts), parts, point };
}

function largestBank(parts: readonly SinglePart[]): Bank | undefined {
  return banksOf(parts)
    .filter(({ branches }) => branches.length > 1)
    .reduce<Bank | undefined>(
      (best, bank) => (best === undefined || bank.branches.length > best.branches.length ? bank : best),
      undefined,
    );
}

interface Named {
  readonly name: string;
  readonly kind: LayoutKind;
}
const NO_TAPS = { plusAt: null, minusAt: null, chargePlusAt: null, chargeMinusAt: null } as const;

/** A layout that was solved as a job. */
function measuredLayout(solved: SolvedBank, named: Named): Layout | undefined {
  const measure = measureBank(solved);
  if (measure === undefined) return undefined;
  const { row } = solved;
  const currentsA = row.branches.map(
    ({ branch }) => measure.strings.find(({ id }) => id === branch.strings[0]!.id)!.currentA,
  );
  const { bankV, lostW } = measure;
  return { ...named, ...NO_TAPS, ...sharesOf(solved, currentsA), bankV, lostW, cableM: cableMetres(row) };
}

function sharesOf({ row }: SolvedBank, currentsA: readonly number[]): Pick<Layout, 'strings' | 'spread' | 'worst'> {
  const totalA = sum(currentsA);
  const deviations = deviationsOf(row, currentsA);
  const strings = row.branches.map(({ branch }, k) => ({
    id: branch.strings[0]!.id,
    currentA: currentsA[k]!,
    share: currentsA[k]! / totalA,
    deviation: deviations[k]!,
  }));
  const worst = indexOfLargest(deviations);
  return { strings, spread: Math.abs(deviations[worst]!), worst: strings[worst]!.id };
}

/** The row of blocks on the bench, to be wired in other ways. */
class RowBench {
  private readonly solved: SolvedBank;
  private readonly ids: readonly PartId[];
  private readonly bankA: number;
  private readonly chargeA: number;
  private readonly shape: RowShape;

  constructor(
    solved: SolvedBank,
    row: { readonly ids: readonly PartId[]; readonly bankA: number; readonly shape: RowShape },
  ) {
    this.solved = solved;
    this.ids = row.ids;
    this.bankA = row.bankA;
    this.shape = row.shape;
    this.chargeA = chargeCurrent(solved);
  }

  /** A ladder of links, tapped at each pair of posts. */
  tapped(chargeAt: Taps | undefined): readonly Layout[] {
    const wired = ladderOf(this.shape);
    const bank = new FactoredBank(wired.network);
    // Chargers matter where loads run at the same time; alone they are the current of the bank.
    const isOn = this.chargeA > 0 && this.bankA + this.chargeA > EQUAL_SPREAD * this.chargeA;
    return tapLayouts(this.ids, { isOn, at: this.chargeA > 0 ? chargeAt : undefined }).map((layout) => {
      const { taps, chargeTaps } = layout;
      const at = ({ plus, minus }: Taps) => ({ plus: wired.plusTaps[plus]!, minus: wired.minusTaps[minus]! });
      const draws =
        chargeTaps === null
          ? [{ ...at(taps), currentA: this.bankA }]
          : [
              { ...at(taps), currentA: this.bankA + this.chargeA },
              { ...at(chargeTaps), currentA: -this.chargeA },
            ];
      const idAt = (place: number | undefined) => (place === undefined ? null : this.ids[place]!);
      return {
        name: layout.name,
        kind: layout.kind,
        plusAt: idAt(taps.plus),
        minusAt: idAt(taps.minus),
        chargePlusAt: idAt(chargeTaps?.plus),
        chargeMinusAt: idAt(chargeTaps?.minus),
        ...this.flowOf(bank, wired, draws),
      };
    });
  }

  /** Equal leads to two bars, and a halving tree. */
  joined(leadM: number | undefined): readonly Layout[] {
    const named = { name: 'equal leads to two bars', kind: 'equal-leads' } as const;
    const star = this.drawnLeadsMadeEqual(leadM, named) ?? this.commonTap(starOf(this.shape, leadM), named);
    // Two blocks halve into two equal leads.
    if (this.ids.length === 2) return [star];
    return [star, this.commonTap(treeOf(this.shape), { name: 'halving tree', kind: 'halving-tree' })];
  }

  /** Where every branch has its own leads to common bars, these as long as the longest of the pole. */
  private drawnLeadsMadeEqual(leadM: number | undefined, named: Named): Layout | undefined {
    const { row, job } = this.solved;
    if (row.isLadder) return undefined;
    const scales = new Map<PartId, number>();
    for (const pole of POLES) {
      const leads = row.branches.map(({ own }) => own[pole].parts.filter((part) => part.kind === 'cable'));
      const lengthsM = leads.map((cables) => sum(cables.map(({ lengthM }) => lengthM)));
      if (lengthsM.some((lengthM) => lengthM === 0)) return undefined;
      const toM = leadM ?? Math.max(...lengthsM);
      leads.forEach((cables, k) => {
        for (const { id } of cables) scales.set(id, toM / lengthsM[k]!);
      });
    }
    const operatingCase = withLeads(job, this.solved.operatingCase, scales);
    const solved = solveBank({ ...this.solved, operatingCase, model: this.solved.point.model });
    return solved === null ? undefined : measuredLayout(solved, named);
  }

  private commonTap(wired: WiredRow, named: Named): Layout {
    const draw = { plus: wired.plusTaps[0]!, minus: wired.minusTaps[0]!, currentA: this.bankA };
    return { ...named, ...NO_TAPS, ...this.flowOf(new FactoredBank(wired.network), wired, [draw]) };
  }

  private flowOf(bank: FactoredBank, { cableM }: WiredRow, draws: readonly BankDraw[]) {
    const flow = bank.flow(draws);
    const { plus, minus } = draws[0]!;
    return {
      ...sharesOf(this.solved, flow.currentsA),
      lostW: flow.heatW,
      bankV: flow.between(plus, minus),
      cableM,
    };
  }
}

/** What chargers, controllers and converters give to the bank in the case, A. */
function chargeCurrent({ row, parts, point }: SolvedBank): number {
  const isOurs = reachOfBank(row.bank, parts);
  const given = parts.flatMap((part) => {
    const output = polesOf(part).find(({ role }) => role === 'source');
    if (part.kind === 'string' || part.kind === 'array' || output === undefined || !isOurs(output)) return [];
    const answer = point.parts.get(part.id);
    return [Math.max(0, (part.kind === 'charger' ? answer?.currentA : answer?.outputA) ?? 0)];
  });
  return sum(given);
}

function reachOfBank(bank: Bank, parts: readonly SinglePart[]) {
  const nets = closedNets(parts);
  const { plus, minus } = bank.branches[0]!;
  return (poles: { readonly plus: JunctionId; readonly minus: JunctionId }) =>
    nets.same(poles.plus, plus) && nets.same(poles.minus, minus);
}

function chargePlaces(ids: readonly PartId[], taps: LayoutsRequest['chargeTaps']): Taps | undefined {
  if (taps === undefined) return undefined;
  const [plus, minus] = [ids.indexOf(taps.plus), ids.indexOf(taps.minus)];
  return plus < 0 || minus < 0 ? undefined : { plus, minus };
}

/**
 * Chargers at taps of their own suit the case that they were worked out for and no other: such a layout is not the best unless it was asked
 * for. Least spread; of equals the bank as drawn, which needs nothing, then the one with the least cable.
 */
function bestOf(layouts: readonly Layout[]): Layout {
  const least = Math.min(...layouts.map(({ spread }) => spread));
  const equals = layouts.filter(({ spread }) => spread <= least + EQUAL_SPREAD);
  const cableM = (layout: Layout) => (layout.kind === 'as-drawn' ? 0 : (layout.cableM ?? Number.POSITIVE_INFINITY));
  return equals.reduce((best, layout) => (cableM(layout) < cableM(best) ? layout : best));
}
