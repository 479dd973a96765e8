/** Which volts reign where in a drawing: nominal, for percentages and 50 V rules, and the highest that can occur. */

import type { Site } from '../job/job.ts';
import type { ArrayPart, JunctionId, StringPart } from '../job/part.ts';
import type { PoledPart, Poles, SinglePart } from '../network/wiring.ts';
import { type Nets, polesOf } from '../network/wiring.ts';
import type { WantedField } from './finding.ts';

/** Nominal volts of a whole string: blocks in series times the block's label. */
function nominalOf(string: StringPart): number {
  return string.blocksInSeries * string.blockNominalV;
}

/** Nets that strings join, and how far each net lies above the others, in nominal volts. */
export interface Bank {
  readonly potentialV: ReadonlyMap<number, number>;
  readonly spreadV: number;
}

export interface HighestVolts {
  readonly volts: number;
  /** What sets it, in words. */
  readonly from: string;
  /** The case in which it was solved; `undefined` for a set-point or a label. */
  readonly case: string | undefined;
  /** A figure that could raise it and is not given. */
  readonly missing: { readonly words: string; readonly field: WantedField } | undefined;
}

/** What was solved, as far as this file needs it. */
export interface SolvedVolts {
  readonly id: string;
  readonly junctions: ReadonlyMap<JunctionId, number | null>;
}

export class SystemVolts {
  private readonly nets: Nets;
  private readonly poles: readonly Poles[];
  private readonly bankOfNet: ReadonlyMap<number, Bank>;
  private readonly settingV: number | undefined;
  private readonly site: Site;
  private readonly solved: readonly SolvedVolts[];
  private readonly highestOfNet = new Map<number, HighestVolts | undefined>();

  /** `parts` as drawn; `everyState` also as they stand in any case (a set-point may differ there). */
  constructor(drawing: {
    readonly parts: readonly SinglePart[];
    readonly everyState: readonly SinglePart[];
    readonly nets: Nets;
    readonly nominalV: number | undefined;
    readonly site: Site;
    readonly solved: readonly SolvedVolts[];
  }) {
    this.nets = drawing.nets;
    this.poles = drawing.everyState.flatMap(polesOf);
    this.settingV = drawing.nominalV;
    this.site = drawing.site;
    this.solved = drawing.solved;
    this.bankOfNet = banksOf(drawing.parts, drawing.nets);
  }

  /** Nominal volts between two junctions: of the strings between them (or the job's setting), else a converter's output. */
  nominalBetween(plus: JunctionId, minus: JunctionId): number | undefined {
    const [p, m] = [this.nets.of(plus), this.nets.of(minus)];
    if (p === undefined || m === undefined) return undefined;
    const bank = this.bankOfNet.get(p);
    if (bank !== undefined && bank === this.bankOfNet.get(m)) {
      const nominalV = Math.abs(bank.potentialV.get(p)! - bank.potentialV.get(m)!);
      // The setting stands for the whole system; a tap on part of a bank keeps its own volts.
      return nominalV === bank.spreadV ? (this.settingV ?? nominalV) : nominalV;
    }
    for (const { part, plus: outPlus, minus: outMinus } of this.sourcesOn(p)) {
      if (part.kind === 'converter' && this.nets.of(outPlus) === p && this.nets.of(outMinus) === m) return part.outputV;
    }
    return undefined;
  }

  /** Nominal system volts of the net that a junction lies on; `undefined` where no string or converter says. */
  nominalAt(junction: JunctionId): number | undefined {
    const net = this.nets.of(junction);
    if (net === undefined) return undefined;
    const bank = this.bankOfNet.get(net);
    if (bank !== undefined) return this.settingV ?? bank.spreadV;
    const outputs = this.sourcesOn(net).flatMap(({ part }) => (part.kind === 'converter' ? [part.outputV] : []));
    return outputs.length === 0 ? undefined : Math.max(...outputs);
  }

  /**
   * The highest volts that a part on this junction can have across it when it opens. On a bank: the widest solved difference
   * between its nets in any case, and every set-point of a charger, controller or converter that feeds it. Elsewhere: of the
   * sources on the net, an array counting with its open-circuit volts in the coldest air of the site,
   *
   *   U = modules Voc (1 + beta (Tmin - 25 degC))
   *
   * `undefined` where no source touches the net.
   */
  highestAt(junction: JunctionId): HighestVolts | undefined {
    const net = this.nets.of(junction);
    if (net === undefined) return undefined;
    if (!this.highestOfNet.has(net)) this.highestOfNet.set(net, this.highestOf(net));
    return this.highestOfNet.get(net);
  }

  /** Highest set-point of the sources that feed exactly these two junctions' nets. */
  setpointBetween(
    plus: JunctionId,
    minus: JunctionId,
  ): { readonly volts: number; readonly part: PoledPart } | undefined {
    const [p, m] = [this.nets.of(plus), this.nets.of(minus)];
    let most: { volts: number; part: PoledPart } | undefined;
    for (const source of this.poles) {
      const volts = setpointOf(source);
      if (volts === undefined || this.nets.of(source.plus) !== p || this.nets.of(source.minus) !== m) continue;
      if (most === undefined || volts > most.volts) most = { volts, part: source.part };
    }
    return most;
  }

  /** Do all these junctions lie on one bank of strings? */
  sharesBank(...junctions: readonly JunctionId[]): boolean {
    const banks = new Set(junctions.map((junction) => this.bankOfNet.get(this.nets.of(junction) ?? -1)));
    return banks.size === 1 && !banks.has(undefined);
  }

  /** Sources with a terminal on a net. */
  sourcesOn(net: number): readonly Poles[] {
    return this.poles.filter(
      ({ role, plus, minus }) => role === 'source' && (this.nets.of(plus) === net || this.nets.of(minus) === net),
    );
  }

  private highestOf(net: number): HighestVolts | undefined {
    const bank = this.bankOfNet.get(net);
    let most: HighestVolts | undefined;
    for (const one of bank === undefined ? this.onSourceNet(net) : this.onBank(bank)) {
      const missing = one.missing ?? most?.missing;
      if (most === undefined || one.volts > most.volts) most = { ...one, missing };
      else most = { ...most, missing };
    }
    return most;
  }

  private onBank(bank: Bank): HighestVolts[] {
    const inBank = (junction: JunctionId) => {
      const net = this.nets.of(junction);
      return net !== undefined && this.bankOfNet.get(net) === bank;
    };
    const found: HighestVolts[] = [
      { volts: bank.spreadV, from: 'nominal volts of the strings', case: undefined, missing: undefined },
    ];
    for (const { id, junctions } of this.solved) {
      let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
      for (const [junction, volts] of junctions) {
        if (volts === null || !inBank(junction)) continue;
        low = Math.min(low, volts);
        high = Math.max(high, volts);
      }
      if (high > low) found.push({ volts: high - low, from: `solved in case ${id}`, case: id, missing: undefined });
    }
    for (const source of this.poles) {
      const volts = setpointOf(source);
      if (volts === undefined || !inBank(source.plus) || !inBank(source.minus)) continue;
      found.push({ volts, from: `set-point of ${source.part.id}`, case: undefined, missing: undefined });
    }
    return found;
  }

  private onSourceNet(net: number): HighestVolts[] {
    const found: HighestVolts[] = [];
    for (const source of this.sourcesOn(net)) {
      if (source.part.kind === 'array') found.push(this.coldOpenCircuit(source.part));
      const volts = setpointOf(source);
      if (volts !== undefined)
        found.push({ volts, from: `set-point of ${source.part.id}`, case: undefined, missing: undefined });
      for (const { id, junctions } of this.solved) {
        const [plus, minus] = [junctions.get(source.plus), junctions.get(source.minus)];
        if (typeof plus !== 'number' || typeof minus !== 'number') continue;
        found.push({ volts: Math.abs(plus - minus), from: `solved in case ${id}`, case: id, missing: undefined });
      }
    }
    return found;
  }

  private coldOpenCircuit(array: ArrayPart): HighestVolts {
    const standardV = array.modulesInSeries * array.vocV;
    const coldest = this.site.ambientMinDegC;
    const beta = array.vocPerDegC;
    if (beta === undefined || coldest === undefined) {
      const missing =
        beta === undefined
          ? { words: `vocPerDegC of array ${array.id}`, field: { part: array.id, field: 'vocPerDegC' } }
          : { words: 'ambientMinDegC of the site', field: { part: null, field: 'site.ambientMinDegC' } };
      return { volts: standardV, from: `open-circuit volts of array ${array.id} at 25 °C`, case: undefined, missing };
    }
    const volts = standardV * Math.max(1, 1 + beta * (coldest - STANDARD_TEST_DEG_C));
    return {
      volts,
      from: `open-circuit volts of array ${array.id} at ${coldest} °C`,
      case: undefined,
      missing: undefined,
    };
  }
}

/** Cell temperature of the figures on a module's label (IEC 61215 standard test conditions). */
const STANDARD_TEST_DEG_C = 25;

/** The volts that a source holds at its output; `undefined` for strings and arrays, which hold none. */
function setpointOf({ part, role }: Poles): number | undefined {
  if (role !== 'source') return undefined;
  if (part.kind === 'charger' || part.kind === 'controller') return part.setpointV;
  return part.kind === 'converter' ? part.outputV : undefined;
}

interface Rise {
  readonly to: number;
  readonly volts: number;
}

function listAt(rises: Map<number, Rise[]>, net: number): Rise[] {
  const known = rises.get(net);
  if (known !== undefined) return known;
  const fresh: Rise[] = [];
  rises.set(net, fresh);
  return fresh;
}

/** Walks from net to net over the strings, adding up their nominal volts; the first way found to a net decides its volts. */
export function banksOf(parts: readonly SinglePart[], nets: Nets): ReadonlyMap<number, Bank> {
  const rises = new Map<number, Rise[]>();
  const link = (minus: number, plus: number, volts: number) => {
    listAt(rises, minus).push({ to: plus, volts });
    listAt(rises, plus).push({ to: minus, volts: -volts });
  };
  for (const part of parts) {
    if (part.kind !== 'string') continue;
    const [plus, minus] = [nets.of(part.plus)!, nets.of(part.minus)!];
    link(minus, plus, nominalOf(part));
    if (part.midpoint !== undefined) link(minus, nets.of(part.midpoint)!, nominalOf(part) / 2);
  }
  const bankOfNet = new Map<number, Bank>();
  for (const start of rises.keys()) {
    if (bankOfNet.has(start)) continue;
    const potentialV = new Map([[start, 0]]);
    const walk = [start];
    for (const net of walk) {
      for (const { to, volts } of rises.get(net)!) {
        if (potentialV.has(to)) continue;
        potentialV.set(to, potentialV.get(net)! + volts);
        walk.push(to);
      }
    }
    const spreadV = Math.max(...potentialV.values()) - Math.min(...potentialV.values());
    const bank: Bank = { potentialV, spreadV };
    for (const net of walk) bankOfNet.set(net, bank);
  }
  return bankOfNet;
}
