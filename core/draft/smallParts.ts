/** The parts of a small system, placed on the drawing from the bank on the left to the load on the right. */
import { sizeText } from '../units/conductorSize.ts';
import type { ProtectedRun } from './protectedRun.ts';
import { inverterRatedW, leastVoltsFraction, type SmallJob, usualInverterEfficiency } from './smallJob.ts';

export interface Chosen {
  /** From bank to load. */
  readonly main: ProtectedRun;
  /** Of each string, where there are several. */
  readonly lead: ProtectedRun;
  /** The most that the main run carries. */
  readonly designA: number;
}

type Fields = Readonly<Record<string, unknown>>;

/** Usual ratings of switches and bars, A. Common practice, no source. */
const switchRatingsA = [50, 100, 200, 300, 600, 1000, 2000];
const barRatingsA = [100, 150, 250, 400, 600, 1000, 2000];
/** A link between blocks with its two lugs, and from which to which it may be. Common practice, no source. */
const linkOhm = { usual: 0.0003, range: [0.0002, 0.0006] } as const;
/** The two terminations of a conductor together. Common practice, no source. */
const endOhm = { usual: 0.0001, range: [0.00005, 0.0003] } as const;
const switchOhm = { usual: 0.0002, range: [0.0001, 0.0004] } as const;
/** Of a lead from a block to its bar; all alike, so that the strings share. */
const leadM = 1;
const step = 160;

export function smallParts(small: SmallJob, chosen: Chosen): readonly Fields[] {
  const isBank = small.blocksInParallel > 1;
  const strings = Array.from({ length: small.blocksInParallel }, (_unused, index) => string(small, chosen, index));
  const bank = isBank ? bankParts(small, chosen) : [];
  const from = isBank ? 'bank plus out' : 'B1 plus';
  const x = isBank ? 460 : 140;
  return [
    ...strings,
    ...bank,
    {
      id: isBank ? 'F-MAIN' : 'F1',
      label: isBank ? 'Main fuse, at the bar' : 'Main fuse, on the post',
      ...fuse(small, chosen.main),
      from,
      to: 'main fuse out',
      at: { x: x + 80, y: 120 },
    },
    run(chosen.main, {
      id: 'W1',
      label: 'Bank to main switch',
      from: { plus: 'main fuse out', minus: isBank ? 'bank minus out' : 'B1 minus' },
      to: { plus: 'main switch in', minus: 'main minus' },
      lengthM: small.bankToMainM,
      at: { x: x + 200, y: 160 },
    }),
    mainSwitch(small, chosen, { x: x + 320, y: 120 }),
    run(chosen.main, {
      id: 'W2',
      label: small.supply === 'ac' ? 'Main switch to inverter' : 'Main switch to load',
      from: { plus: 'main plus', minus: 'main minus' },
      to: { plus: 'load plus', minus: 'load minus' },
      lengthM: small.mainToLoadM,
      at: { x: x + 440, y: 160 },
    }),
    {
      ...(small.supply === 'ac' ? inverter(small) : load(small)),
      plus: 'load plus',
      minus: 'load minus',
      at: { x: x + 560, y: 160 },
    },
  ];
}

function blocksInSeries({ systemV, blockNominalV }: SmallJob): number {
  return Math.max(1, Math.round(systemV / blockNominalV));
}

function string(small: SmallJob, { main, lead }: Chosen, index: number): Fields {
  const { chemistry, blockNominalV, capacityAh } = small;
  const blocks = blocksInSeries(small);
  const links = blocks - 1;
  const linked =
    links === 0
      ? {}
      : {
          linkOhm: tidy(linkOhm.usual * links),
          // As thick as the string's own lead: it carries the same.
          linkSize: fileSize(small.blocksInParallel > 1 ? lead : main),
          origin: { linkOhm: 'default', linkSize: 'guess' },
          range: { linkOhm: linkOhm.range.map((ohm) => tidy(ohm * links)) },
        };
  const id = `B${String(index + 1)}`;
  return {
    id,
    kind: 'string',
    label: small.blocksInParallel > 1 ? `String ${String(index + 1)}` : 'Bank',
    plus: `${id} plus`,
    minus: `${id} minus`,
    chemistry,
    blocksInSeries: blocks,
    blockNominalV,
    capacityAh,
    ...linked,
    at: { x: 120, y: 160 + step * index },
  };
}

/** Each string's fuse on its post and its two leads, and the two bars. */
function bankParts(small: SmallJob, { lead, designA }: Chosen): readonly Fields[] {
  const numbers = Array.from({ length: small.blocksInParallel }, (_unused, index) => index + 1);
  const leads = numbers.flatMap((number) => {
    const [n, y] = [String(number), 120 + step * (number - 1)];
    const common = { ...conductor(lead), lengthM: leadM, origin: { ...conductorOrigin, lengthM: 'guess' } };
    return [
      {
        id: `F${n}`,
        label: `String ${n} fuse, on the post`,
        ...fuse(small, lead),
        from: `B${n} plus`,
        to: `F${n} out`,
        at: { x: 220, y },
      },
      {
        id: `C${n}+`,
        kind: 'cable',
        label: `String ${n} plus lead`,
        from: `F${n} out`,
        to: `bank plus ${n}`,
        ...common,
        at: { x: 340, y },
      },
      {
        id: `C${n}-`,
        kind: 'cable',
        label: `String ${n} minus lead`,
        from: `bank minus ${n}`,
        to: `B${n} minus`,
        ...common,
        at: { x: 280, y: y + 80 },
      },
    ];
  });
  const bars = (['plus', 'minus'] as const).map((pole, index) => ({
    id: pole === 'plus' ? 'BAR+' : 'BAR-',
    kind: 'busbar',
    label: `Bank ${pole} bar`,
    junctions: [`bank ${pole} out`, ...numbers.map((number) => `bank ${pole} ${String(number)}`)],
    ratingA: barRatingsA.find((ratingA) => ratingA >= designA) ?? designA,
    ratingV: usualRatingV(small),
    origin: { ratingA: 'guess', ratingV: 'guess' },
    at: { x: 440 - 60 * index, y: 160 + 80 * index },
  }));
  return [...leads, ...bars];
}

function usualRatingV({ systemV }: SmallJob): number {
  return systemV > 24 ? 80 : 48;
}

/** Types for direct current that open what a bank can give: class T where the trade sells it, else gG. */
function fuse({ practice }: SmallJob, { ratingA }: ProtectedRun): Fields {
  const american = practice === 'us-land' || practice === 'us-marine';
  const type = american
    ? { type: 'class_T', ratingV: 125, interruptA: 20_000 }
    : { type: 'gG', ratingV: 80, interruptA: 25_000 };
  return {
    kind: 'fuse',
    ratingA,
    ...type,
    origin: { ratingA: 'guess', type: 'guess', ratingV: 'guess', interruptA: 'default' },
  };
}

const conductorOrigin = { size: 'guess', run: 'guess', endOhm: 'default' } as const;

/** A file keeps to plain letters. */
function fileSize({ size }: ProtectedRun): string {
  return sizeText(size).replace('²', '2');
}

function conductor(chosen: ProtectedRun): Fields {
  return {
    size: fileSize(chosen),
    run: 'free-air',
    endOhm: endOhm.usual,
    origin: conductorOrigin,
    range: { endOhm: [...endOhm.range] },
  };
}

function run(chosen: ProtectedRun, fields: Fields): Fields {
  const { at, id, label, from, to, lengthM } = fields;
  return { id, kind: 'pair', label, from, to, lengthM, ...conductor(chosen), at };
}

function mainSwitch(small: SmallJob, { main, designA }: Chosen, at: Fields): Fields {
  return {
    id: 'S1',
    kind: 'switch',
    label: 'Main switch',
    from: 'main switch in',
    to: 'main plus',
    ratingA: switchRatingsA.find((ratingA) => ratingA >= main.ratingA) ?? designA,
    ratingV: usualRatingV(small),
    loadBreak: true,
    resistanceOhm: switchOhm.usual,
    origin: { ratingA: 'guess', ratingV: 'guess', loadBreak: 'guess', resistanceOhm: 'default' },
    range: { resistanceOhm: [...switchOhm.range] },
    at,
  };
}

function load({ loadW, systemV }: SmallJob): Fields {
  return {
    id: 'L1',
    kind: 'load',
    label: 'The load',
    powerW: loadW,
    minimumV: tidy(leastVoltsFraction * systemV),
    maximumV: tidy((16 / 12) * systemV),
    continuous: true,
    dropClass: 'critical',
    origin: { minimumV: 'guess', maximumV: 'guess', continuous: 'guess', dropClass: 'guess' },
  };
}

function inverter({ loadW, systemV }: SmallJob): Fields {
  const ratedW = inverterRatedW(loadW);
  return {
    id: 'INV1',
    kind: 'inverter',
    label: 'Inverter',
    acPowerW: loadW,
    ratedW,
    efficiency: usualInverterEfficiency,
    standbyW: tidy(0.01 * ratedW),
    cutoffV: tidy(leastVoltsFraction * systemV),
    origin: { ratedW: 'guess', efficiency: 'guess', standbyW: 'guess', cutoffV: 'guess' },
    range: { efficiency: [0.85, 0.94] },
  };
}

/** Without the dust of a product of decimals. */
function tidy(value: number): number {
  return Number(value.toPrecision(6));
}
