/** The one-line diagram: everything is drawn, nothing runs over anything else, and what cannot be drawn says why. */
import { describe, expect, test } from 'vitest';
import type { Shape } from '../../core/diagram/shape.ts';
import { wiringGraph } from '../../core/diagram/wiringGraph.ts';
import { type Layout, layWiring, yOf } from '../../core/diagram/wiringLayout.ts';
import { buildReport } from '../../core/report/buildReport.ts';
import { diagramSection } from '../../core/report/diagram/diagramSection.ts';
import type { FigureBlock } from '../../core/report/document.ts';
import { examples } from '../../data/examples/index.ts';
import { checked } from './reportInput.ts';
import { cabin, van } from './reportJobs.ts';
import { largeJob } from './reportLargeJob.ts';
import { cabinInput, point } from './reportSample.ts';

function layoutOf(file: object): Layout {
  const graph = wiringGraph(checked(file));
  if ('reason' in graph) throw new Error(graph.reason);
  const layout = layWiring(graph);
  if ('reason' in layout) throw new Error(layout.reason);
  return layout;
}
const figuresOf = (file: object): readonly FigureBlock[] =>
  diagramSection(checked(file), 'A4').flatMap((block) => (block.kind === 'figure' ? [block] : []));
const figureOf = (file: object): FigureBlock | undefined => figuresOf(file)[0];
const textsOf = (figures: readonly FigureBlock[]): readonly string[] =>
  figures.flatMap(({ shapes }) => shapes.flatMap((shape: Shape) => (shape.shape === 'text' ? [shape.text] : [])));
const reasonOf = (file: object): string => {
  const paragraph = diagramSection(checked(file), 'A4').find((block) => block.kind === 'paragraph');
  return paragraph?.kind === 'paragraph' ? paragraph.text : '';
};
const job = (parts: readonly object[]) => ({
  format: 'ohmwright-job',
  version: 1,
  title: 'Invented',
  practice: 'iec-land',
  parts,
});
const string = (id: string, plus: string, minus: string) => ({
  id,
  kind: 'string',
  plus,
  minus,
  chemistry: 'agm',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 100,
});
const cable = (id: string, from: string, to: string) => ({ id, kind: 'cable', from, to, lengthM: 1, size: '16 mm2' });
const load = (id: string, plus: string, minus: string) => ({ id, kind: 'load', plus, minus, powerW: 50 });

describe('a cabin of three strings', () => {
  const layout = layoutOf(cabin);

  test('batteries stand at the left, what they feed at the right', () => {
    const sides = new Map<string, string>(layout.devices.map(({ device, side }) => [device.part.id, side]));
    expect([sides.get('S-A'), sides.get('S-B'), sides.get('S-C')]).toEqual(['left', 'left', 'left']);
    expect([sides.get('INV1'), sides.get('FRIDGE'), sides.get('PV'), sides.get('GEN')]).toEqual([
      'right',
      'right',
      'right',
      'right',
    ]);
  });

  test('every conductor and device is drawn, both poles in full', () => {
    const texts = textsOf(figuresOf(cabin));
    for (const { id, kind } of checked(cabin).parts) {
      const names = kind === 'pair' ? [`${id}.plus`, `${id}.minus`] : [id];
      for (const name of names)
        expect(texts.some((text) => text === name || (text.endsWith('…') && name.startsWith(text.slice(0, -1))))).toBe(
          true,
        );
    }
  });

  test('a busbar is one upright bar at which all its taps meet', () => {
    const bars = layout.points.filter(({ isBar }) => isBar);
    expect(bars.map(({ name }) => name)).toEqual(['BAR+']);
    // Three strings at the left; the main switch, the solar controller and the generator charger at the right.
    const ends = [...layout.links, ...layout.wires].filter(
      ({ x1, x2, pole }) => pole === 'plus' && (x1 === bars[0]?.x || x2 === bars[0]?.x),
    );
    expect(ends).toHaveLength(6);
  });

  test('the controller stands over both its lines', () => {
    expect(layout.boxes.map(({ twoPort }) => twoPort.part.id)).toEqual(['MPPT']);
  });
});

describe('the wiring as people do it', () => {
  test('a bank tapped at opposite ends is drawn as a chain on each pole', () => {
    const layout = layoutOf(
      job([
        string('S1', 'P1', 'N1'),
        string('S2', 'P2', 'N2'),
        string('S3', 'P3', 'N3'),
        cable('P12', 'P1', 'P2'),
        cable('P23', 'P2', 'P3'),
        cable('N12', 'N1', 'N2'),
        cable('N23', 'N2', 'N3'),
        load('L', 'P1', 'N3'),
      ]),
    );
    expect(layout.links).toHaveLength(4);
    const x = new Map(layout.points.map((one) => [one.name, one.x]));
    // Plus grows away from S1, minus away from S3: the taps of the load are the innermost points of their poles.
    expect(x.get('P1')).toBeGreaterThan(x.get('P2') ?? Number.NaN);
    expect(x.get('P2')).toBeGreaterThan(x.get('P3') ?? Number.NaN);
    expect(x.get('N3')).toBeGreaterThan(x.get('N2') ?? Number.NaN);
    expect(x.get('N2')).toBeGreaterThan(x.get('N1') ?? Number.NaN);
  });

  test('a ring of conductors is closed by a line of its own', () => {
    const layout = layoutOf(
      job([
        string('S', 'P', 'N'),
        cable('A', 'P', 'Q'),
        cable('B', 'Q', 'R'),
        cable('C', 'R', 'P'),
        load('L', 'R', 'N'),
      ]),
    );
    expect(new Set(layout.links.map(({ link }) => link.id))).toEqual(new Set(['A', 'B', 'C']));
  });

  test('two systems that share nothing stand one below the other', () => {
    const layout = layoutOf(
      job([string('S', 'P', 'N'), load('L', 'P', 'N'), string('T', 'U', 'V'), load('M', 'U', 'V')]),
    );
    const row = new Map<string, number>(layout.devices.map(({ device, row }) => [device.part.id, row]));
    expect(row.get('T')).toBeGreaterThan(row.get('S') ?? Number.NaN);
    expect(row.get('M')).toBe(row.get('T'));
  });
});

describe('what does not go into the plan in rows is drawn as it is laid out on the screen', () => {
  const series = job([string('S1', 'M', 'N'), string('S2', 'P', 'M'), load('L', 'P', 'N')]);

  test('strings that are joined in series point by point, with the reason', () => {
    expect(reasonOf(series)).toContain('Drawn as it is laid out on the screen');
    expect(reasonOf(series)).toContain('point M belongs to both poles');
    const texts = textsOf(figuresOf(series));
    for (const word of ['S1', 'S2', 'L', '50 W']) expect(texts).toContain(word);
    expect(texts.some((text) => text.startsWith('Drawn as it is laid out on the screen'))).toBe(true);
  });

  test('every part of the ketch stands on its sheets by its id, and no word is smaller than 6 pt', () => {
    const ketch = JSON.parse(examples.find(({ name }) => name === 'estuary-ketch')?.text ?? '') as object;
    const figures = figuresOf(ketch);
    const texts = textsOf(figures);
    for (const { id } of checked(ketch).parts) expect(texts).toContain(id);
    // The room of a figure on a landscape A4 page below its heading; words are 7 pt at full size.
    for (const { width, height } of figures)
      expect(7 * Math.min(1, 745 / width, 343 / height)).toBeGreaterThanOrEqual(6);
  });

  test('no shape of a sheet lies outside it', () => {
    for (const { width, height, shapes } of figuresOf(series)) {
      for (const shape of shapes) {
        if (shape.shape !== 'line') continue;
        expect(Math.min(shape.x1, shape.x2, shape.y1, shape.y2)).toBeGreaterThanOrEqual(0);
        expect(Math.max(shape.x1, shape.x2)).toBeLessThanOrEqual(width);
        expect(Math.max(shape.y1, shape.y2)).toBeLessThanOrEqual(height);
      }
    }
  });

  test('a job that takes more sheets than anybody would follow is listed only', () => {
    const large = checked(largeJob(300));
    const blocks = buildReport({ ...cabinInput(), job: large, points: [point(large, { case: 'as-drawn' })] }).blocks;
    expect(blocks.some(({ kind }) => kind === 'figure')).toBe(false);
    const table = blocks.find((block) => block.kind === 'table' && block.caption === 'Connections');
    // 3 parts, and 99 branches whose run is two conductors.
    expect(table?.kind === 'table' ? table.rows.length : 0).toBe(3 + 99 * 4);
  });
});

test('a drawing of many rows is divided into sheets on which every device stands once', () => {
  const boat = job([
    string('S', 'P', 'N'),
    ...Array.from({ length: 15 }, (_, index) => [
      cable(`W${index}`, 'P', `Q${index}`),
      load(`L${index}`, `Q${index}`, 'N'),
    ]).flat(),
  ]);
  const figures = figuresOf(boat);
  expect(figures.length).toBeGreaterThan(1);
  expect(figures[0]?.title).toBe(`One-line diagram, both poles in full, sheet 1 of ${figures.length}`);
  const texts = textsOf(figures);
  for (let index = 0; index < 15; index += 1) expect(texts.filter((text) => text === `L${index}`)).toHaveLength(1);
  expect(texts).toContain('goes on on another sheet');
});

test.each(examples)('the example $name is drawn on both papers', ({ text }) => {
  const example = checked(JSON.parse(text) as object);
  for (const paper of ['A4', 'Letter'] as const) {
    expect(diagramSection(example, paper).filter(({ kind }) => kind === 'figure').length).toBeGreaterThan(0);
  }
});

describe('random wiring', () => {
  /** Small linear congruential generator, so that a failure can be seen again (constants of Numerical Recipes). */
  function generator(seed: number): (below: number) => number {
    let state = seed;
    return (below) => {
      state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
      return Math.floor((state / 2 ** 32) * below);
    };
  }
  /** A tree of cables on each pole with strings and loads hung anywhere, and now and then a cable that closes a ring. */
  function randomJob(seed: number): object {
    const pick = generator(seed);
    const points = 2 + pick(6);
    const parts: object[] = [];
    for (const pole of ['P', 'N']) {
      for (let index = 1; index < points; index += 1)
        parts.push(cable(`${pole}c${index}`, `${pole}${pick(index)}`, `${pole}${index}`));
      if (pick(4) === 0) parts.push(cable(`${pole}ring`, `${pole}0`, `${pole}${points - 1}`));
    }
    for (let index = 0; index < 1 + pick(3); index += 1)
      parts.push(string(`S${index}`, `P${pick(points)}`, `N${pick(points)}`));
    for (let index = 0; index < 1 + pick(4); index += 1)
      parts.push(load(`L${index}`, `P${pick(points)}`, `N${pick(points)}`));
    return job(parts);
  }

  test('is drawn whole without a line over another, or refused with a reason', () => {
    let drawn = 0;
    for (let seed = 1; seed <= 300; seed += 1) {
      const graph = wiringGraph(checked(randomJob(seed)));
      if ('reason' in graph) continue;
      const layout = layWiring(graph);
      if ('reason' in layout) continue;
      drawn += 1;
      expect([seed, layout.links.length, layout.devices.length]).toEqual([
        seed,
        graph.links.length,
        graph.devices.length,
      ]);
      expect([seed, ...levelClashes(layout)]).toEqual([seed]);
      expect([seed, ...uprightClashes(layout)]).toEqual([seed]);
      expect([seed, ...falseTouches(layout)]).toEqual([seed]);
      for (const { x, rows } of layout.points) {
        expect(x).toBeGreaterThan(0);
        expect(x).toBeLessThan(layout.width);
        expect(rows[0]).toBeGreaterThanOrEqual(0);
        expect(rows.at(-1)).toBeLessThan(layout.rowCount);
      }
    }
    // Most random wiring must be drawable, or the property above says little.
    expect(drawn).toBeGreaterThan(150);
  });

  type Level = { readonly x1: number; readonly x2: number; readonly y: number; readonly name: string };
  function levelsOf(layout: Layout): readonly Level[] {
    return [
      ...layout.links.map((placed) => ({ ...placed, y: yOf(placed), name: placed.link.id })),
      ...layout.wires.map((wire) => ({ ...wire, y: yOf(wire), name: 'wire' })),
    ].map(({ x1, x2, y, name }) => ({ x1: Math.min(x1, x2), x2: Math.max(x1, x2), y, name }));
  }
  function levelClashes(layout: Layout): readonly string[] {
    return clashes(
      levelsOf(layout).map(({ x1, x2, y, name }) => ({ at: y, low: x1, high: x2, name })),
      0,
    );
  }
  function uprightClashes(layout: Layout): readonly string[] {
    // Upright lines that touch end to end would read as one: they may not even touch.
    const uprights = layout.points.map(({ x, rows, pole, name }) => {
      const ys = rows.map((row) => yOf({ row, pole }));
      return { at: x, low: Math.min(...ys), high: Math.max(...ys), name };
    });
    return clashes(uprights, -0.01);
  }
  /** An upright line that ends on a level line would seem joined to it: only the lines that end there may be there. */
  function falseTouches(layout: Layout): readonly string[] {
    const levels = levelsOf(layout);
    return layout.points.flatMap(({ x, rows, pole, name }) =>
      [rows[0] ?? 0, rows.at(-1) ?? 0].flatMap((row) => {
        const y = yOf({ row, pole });
        return levels
          .filter((level) => Math.abs(level.y - y) < 0.01 && level.x1 < x - 0.01 && level.x2 > x + 0.01)
          .map((level) => `${name} touches ${level.name}`);
      }),
    );
  }
  function clashes(
    lines: readonly { readonly at: number; readonly low: number; readonly high: number; readonly name: string }[],
    leastPt: number,
  ): readonly string[] {
    return lines.flatMap((one, index) =>
      lines
        .slice(index + 1)
        .filter(
          (other) =>
            Math.abs(one.at - other.at) < 0.01 &&
            Math.min(one.high, other.high) - Math.max(one.low, other.low) > leastPt,
        )
        .map((other) => `${one.name} over ${other.name}`),
    );
  }
});

test('the words under the picture name every device for those who cannot see it', () => {
  const alt = figureOf(van)?.alt ?? '';
  expect(alt).toContain('battery lithium iron phosphate B1 between B1+ and B1-');
  expect(alt).toContain('inverter INV between I+ and I-');
});
