/** Figures of the row of blocks for layouts that are not drawn: each branch as one source, the wire between them, and how far apart they lie. */
import { stringSource } from '../../battery/stringSource.ts';
import { conductorResistance, temperatureRatio } from '../../conductor/resistance.ts';
import { Defect } from '../../job/issue.ts';
import type { CablePart } from '../../job/part.ts';
import { ambientOf } from '../../network/circuit.ts';
import { conductorModel } from '../../network/conductorModel.ts';
import { sizeText } from '../../units/conductorSize.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import { pieceOhm, type RowShape, type RowSource, type Wire } from './layoutNetworks.ts';
import { type SolvedBank, sum } from './measure.ts';
import type { RowBranch, RowLink } from './row.ts';
import { closedMeetings, type LinePart, wayFrom } from './ways.ts';

/** Middle to middle of blocks that stand side by side; common practice, no source. */
const USUAL_SPACING_M = 0.25;
/** Two crimped lugs with their bolts, planning value; common practice, no source. */
const USUAL_ENDS_OHM = 0.0001;
const USUAL_SIZE = { system: 'mm2', areaMm2: 35 } as const;

interface ShapeWanted {
  readonly spacingM?: number | undefined;
  readonly linkOhm?: number | undefined;
}
interface AssumedShape extends RowShape {
  readonly linkOhm: number;
  readonly assumed: readonly string[];
}

/** Sources as they stand in the case, links from the drawing where it has a ladder of them, else a marked guess. */
export function shapeOf(solved: SolvedBank, wanted: ShapeWanted): AssumedShape {
  const { row } = solved;
  const found = row.isLadder ? drawnLinks(solved, row.links) : guessedLinks(solved);
  const spacingM = wanted.spacingM ?? found.spacingM;
  const ownOhm = pieceOhm(found.wire, spacingM);
  const linkOhm = wanted.linkOhm ?? ownOhm;
  const wire = wanted.linkOhm === undefined ? found.wire : wireFor(linkOhm, found.wire, spacingM);
  const said = (text: string, isGiven: boolean) => (isGiven ? [] : [text]);
  return {
    sources: row.branches.map((branch) => sourceOf(solved, branch)),
    spacingM,
    wire,
    linkOhm,
    assumed: [
      ...said(found.spacingText, wanted.spacingM !== undefined),
      ...said(`${found.wireText}: one link has ${ohms(linkOhm)}.`, wanted.linkOhm !== undefined),
      ...found.more,
    ],
  };
}

/** A branch with the devices that go with it; its leads too where the drawing has links between neighbours beside them. */
function sourceOf(solved: SolvedBank, { branch, own }: RowBranch): RowSource {
  const { job, tables, operatingCase, point, row, parts } = solved;
  const context = { model: point.model, ambientDegC: ambientOf(job, operatingCase), tables: tables.chemistry };
  const sources = branch.strings.map((part) => ({ part, source: stringSource(part, context) }));
  const at = closedMeetings(parts);
  const between = branch.strings.slice(1).flatMap((_, k) => {
    const lower = branch.strings[k]!;
    return wayFrom(lower.plus, lower.id, at).parts;
  });
  const devices = [...own.plus.parts, ...own.minus.parts].filter(({ kind }) => row.isLadder || kind !== 'cable');
  return {
    emfV: sum(sources.map(({ source }) => source.emfV.value)),
    ohm:
      sum(sources.map(({ part, source }) => source.resistanceOhm.value + part.linkOhm)) +
      sum([...between, ...devices].map((part) => ohmOf(part, solved))),
  };
}

/** Resistance at the operating point: a loaded cable is warm, a diode has its drop. */
function ohmOf(part: LinePart, { job, tables, operatingCase, point }: SolvedBank): number {
  const answer = point.parts.get(part.id);
  const [currentA, dropV] = [Math.abs(answer?.currentA ?? 0), answer?.dropV ?? 0];
  if (currentA > LEAST_TELLING_A) return dropV / currentA;
  switch (part.kind) {
    case 'cable': {
      const ambientDegC = ambientOf(job, operatingCase);
      const detail = `${job.practice} ${String(ambientDegC)}`;
      return conductorModel(part, { practice: job.practice, ambientDegC, tables, detail }).coldOhm;
    }
    case 'joint':
      return part.resistanceOhm;
    case 'shunt':
      return part.ratingMv / 1000 / part.ratingA;
    case 'fuse':
    case 'breaker':
    case 'switch':
      return part.resistanceOhm ?? 0;
    default:
      return 0;
  }
}

/** A current that gives a resistance to all but the last few digits of a solve. */
const LEAST_TELLING_A = 0.1;

interface Links {
  readonly spacingM: number;
  readonly wire: Wire;
  readonly spacingText: string;
  readonly wireText: string;
  readonly more: readonly string[];
}

function drawnLinks(solved: SolvedBank, links: readonly RowLink[]): Links {
  const linkOhm = median(links.map(({ parts }) => sum(parts.map((part) => ohmOf(part, solved)))));
  const lengths = links.map(({ parts }) => sum(parts.map((part) => (part.kind === 'cable' ? part.lengthM : 0))));
  const hasLengths = lengths.every((lengthM) => lengthM > 0);
  const spacingM = hasLengths ? median(lengths) : USUAL_SPACING_M;
  const endsOhm = median(
    links.map(({ parts }) => sum(parts.map((part) => (part.kind === 'cable' ? part.endOhm / part.inParallel : 0)))),
  );
  return {
    spacingM,
    wire: wireFor(linkOhm, { perMetreOhm: 0, endsOhm }, spacingM),
    spacingText: hasLengths
      ? `Blocks lie ${metres(spacingM)} apart, the middle length of the links as drawn.`
      : `Blocks lie ${metres(spacingM)} apart: the links as drawn have no length (common practice, no source).`,
    wireText: 'All links are alike, like the middle one of those drawn',
    more: links.every(({ pole }) => pole === links[0]!.pole)
      ? [`Only the ${links[0]!.pole} posts have links as drawn; the other bar is taken to be like that one.`]
      : [],
  };
}

/** The same wire with the ohms of one link as wanted: its terminations first, the rest by the metre. */
function wireFor(linkOhm: number, { endsOhm }: Wire, spacingM: number): Wire {
  const ends = Math.min(endsOhm, linkOhm);
  return { endsOhm: ends, perMetreOhm: (linkOhm - ends) / spacingM };
}

function guessedLinks(solved: SolvedBank): Links {
  const lead = longestLead(solved);
  const endsOhm = lead?.given.has('endOhm') === true ? lead.endOhm / lead.inParallel : USUAL_ENDS_OHM;
  const sized = lead?.size === undefined ? '' : ` (${sizeText(lead.size)})`;
  return {
    spacingM: USUAL_SPACING_M,
    wire: { endsOhm, perMetreOhm: lead === undefined ? usualOhmPerM(solved) : ohmPerM(lead, solved) },
    spacingText: `Blocks in a row, ${metres(USUAL_SPACING_M)} from middle to middle: a guess, the drawing does not say (common practice, no source).`,
    wireText:
      lead === undefined
        ? `Links of ${sizeText(USUAL_SIZE)} with terminations of ${ohms(endsOhm)} a piece: a guess`
        : `Links of the cable of ${lead.id}${sized} with terminations of ${ohms(endsOhm)} a piece: a guess`,
    more: [
      'Bars are taken at the middle of the row, without resistance of their own; halving legs are of the same cable as the links.',
    ],
  };
}

/** The longest cable that carries one branch alone. */
function longestLead({ row }: Pick<SolvedBank, 'row'>): CablePart | undefined {
  const leads = row.branches.flatMap(({ own }) =>
    [...own.plus.parts, ...own.minus.parts].filter((part) => part.kind === 'cable'),
  );
  return leads.reduce<CablePart | undefined>(
    (best, lead) => (best === undefined || lead.lengthM > best.lengthM ? lead : best),
    undefined,
  );
}

function ohmPerM(lead: CablePart, solved: SolvedBank): number {
  return Math.max(0, ohmOf(lead, solved) - lead.endOhm / lead.inParallel) / lead.lengthM;
}

function usualOhmPerM({ job, tables, operatingCase }: SolvedBank): number {
  const run = { lengthM: 1, size: USUAL_SIZE, inParallel: 1, metal: undefined, stranding: undefined };
  const found = conductorResistance(run, { practice: job.practice, tables: tables.conductors });
  if ('missing' in found) throw new Defect(`the tables know ${sizeText(USUAL_SIZE)}`);
  return found.at20Ohm * temperatureRatio(ambientOf(job, operatingCase), found.alphaPerK);
}

function median(values: readonly number[]): number {
  const sorted = [...values];
  sorted.sort((a, b) => a - b);
  const middle = sorted.length / 2;
  return (sorted[Math.ceil(middle) - 1]! + sorted[Math.floor(middle)]!) / 2;
}

function ohms(value: number): string {
  return formatQuantity({ value, unit: 'ohm', digits: 3 });
}
function metres(value: number): string {
  return formatQuantity({ value, unit: 'm', digits: 3 });
}
