/** The rows in `data/`: whole, rising, each with a source that SOURCES.md describes. */
import { describe, expect, it } from 'vitest';
import { type Basis, type Practice, type Status, sizesOf, sizeText } from '../../core/api.ts';
import { SQUARE_ROOT_LAW } from '../../core/conductor/rating.ts';
import { areaMm2 } from '../../core/conductor/size.ts';
import { readRows } from '../../data/chemistry/rows.ts';
import { cellsOf, clauseFigure, figureOf, sizeOf, sources } from '../../data/conductors/figures.ts';
import { tables } from '../../data/index.ts';
import sourcesMd from '../../data/SOURCES.md?raw';

const { conductors, devices, practices } = tables;
const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];

/** Every basis anywhere inside a value. */
function basesIn(value: unknown, found: Basis[] = []): Basis[] {
  if (value instanceof Map) for (const each of value.values()) basesIn(each, found);
  else if (typeof value === 'object' && value !== null) {
    if ('source' in value && 'status' in value && 'text' in value) found.push(value as Basis);
    else for (const each of Object.values(value)) basesIn(each, found);
  }
  return found;
}

const rises = (values: readonly number[]) => values.slice(1).every((value, index) => value > (values[index] ?? value));

describe('sources', () => {
  const bases = basesIn({ conductors, devices, practices });

  it('every figure names a source that SOURCES.md describes under the same printed phrase', () => {
    expect(bases.length).toBeGreaterThan(1000);
    for (const { source, text } of bases) {
      expect(sourcesMd).toContain(`| ${source} |`);
      expect(text.startsWith(sources.get(source) ?? 'no such source')).toBe(true);
    }
    for (const [id, text] of sources) expect(sourcesMd).toContain(`| ${id} | ${text} |`);
  });

  it('common practice is the status of sources that say so, and of no others', () => {
    for (const { text, status } of bases) expect(text.includes('common practice')).toBe(status === 'common-practice');
    expect(sourcesMd).toContain(`| ${SQUARE_ROOT_LAW.source} | ${SQUARE_ROOT_LAW.text} |`);
  });

  it('SOURCES.md names no host of a maker or retailer', () => {
    expect(sourcesMd).toContain('host withheld');
    expect(sourcesMd).not.toMatch(/https?:\/\//);
  });
});

describe('tables', () => {
  const ampacities = [
    conductors.usLand.current,
    conductors.usLand.before2011,
    conductors.usMarine.table,
    conductors.isoMarine.table,
    conductors.iecLand.pvc70,
    conductors.iecLand.xlpe90,
    conductors.iecLand.flexible60,
  ];

  it.each(ampacities.map((table) => [table.name, table] as const))('%s rises down every column', (_name, table) => {
    const columns = new Set(table.rows.flatMap((row) => [...row.amperesA.keys()]));
    let area = 0;
    for (const row of table.rows) {
      expect(areaMm2(row.size, conductors)).toBeGreaterThan(area);
      area = areaMm2(row.size, conductors);
    }
    for (const column of columns) {
      const amperes = table.rows.flatMap((row) => row.amperesA.get(column)?.value ?? []);
      expect(amperes.length).toBeGreaterThan(10);
      expect(rises(amperes)).toBe(true);
    }
  });

  it('factor bands rise without a gap and never rise in factor', () => {
    const bandTables = [
      conductors.usLand.ambient,
      conductors.usLand.bundling,
      conductors.usMarine.bundling,
      conductors.isoMarine.bundling,
      conductors.iecLand.ambient,
      conductors.iecLand.grouping,
    ];
    for (const bands of bandTables) {
      for (const [index, band] of bands.slice(1).entries()) {
        const before = bands[index];
        expect(band.from).toBe((before?.to ?? Number.NaN) + 1);
        for (const [column, figure] of band.factors) {
          expect(figure.value).toBeLessThanOrEqual(before?.factors.get(column)?.value ?? 0);
        }
      }
    }
  });

  it('printed circular mils of the US table agree with the sizes they stand beside', () => {
    for (const row of conductors.usResistance) {
      const cmil = areaMm2(row.size, conductors) / ((Math.PI / 4) * 0.0254 ** 2);
      // Trade rounding of the print (1620 for 1624): 0.3 %.
      expect(Math.abs(row.areaCmil / cmil - 1)).toBeLessThan(0.003);
    }
  });
});

describe('trade lists', () => {
  it('stand in rising area, as the size lists promise', () => {
    for (const system of ['mm2', 'awg', 'kcmil', 'sae', 'auto'] as const) {
      expect(rises(sizesOf(system, conductors).map((size) => areaMm2(size, conductors)))).toBe(true);
    }
  });
});

describe('devices', () => {
  it('standard ratings rise; the fuse series holds the small ratings and the shared ones', () => {
    for (const { ratingsA } of devices.ratings.values()) {
      expect(rises(ratingsA)).toBe(true);
    }
    const shared = devices.ratings.get('nec_240_6A_fuse_and_breaker')?.ratingsA ?? [];
    expect(shared).toHaveLength(37);
    expect(devices.ratings.get('nec_240_6A_fuse')?.ratingsA).toEqual([1, 3, 6, 10, ...shared]);
  });

  it('a series with one remembered rating is remembered as a whole, and says which', () => {
    const regular = devices.ratings.get('blade_regular');
    expect(regular?.basis.status).toBe('from-memory');
    expect(regular?.fromMemoryA).toEqual([35]);
    expect(devices.ratings.get('blade_mini')).toMatchObject({ basis: { status: 'published' }, fromMemoryA: [] });
    expect(devices.ratings.get('iec_60269_gG_series')?.fromMemoryA).toHaveLength(26);
  });

  it('least breaker interrupt ratings grow with the bank', () => {
    const low = devices.breakerInterrupt.filter((row) => row.fromV === 12);
    expect(low.map((row) => [row.mainA.value, row.branchA.value])).toEqual([
      [1500, 750],
      [3000, 1500],
      [5000, 2500],
    ]);
  });
});

describe('practices', () => {
  const status: Readonly<Record<Practice, Status>> = {
    'us-land': 'published',
    'us-marine': 'published',
    'iso-marine': 'from-memory',
    'iec-land': 'published',
  };
  it.each([
    ['us-land', 1, 1],
    ['us-marine', 1.5, 1],
    ['iso-marine', 1, 1],
    ['iec-land', 1, 1],
  ] as const)('%s: fuse over cable %f below 50 V, %f from 50 V', (practice, below, from) => {
    const table = practices[practice];
    expect([table.fuseOverCableBelow50V.value, table.fuseOverCableFrom50V.value]).toEqual([below, from]);
    expect(table.fuseOverCableBelow50V.basis.status).toBe(status[practice]);
    expect(devices.ratings.has(table.standardRatings)).toBe(true);
  });

  it('next size up: to 800 A on US land, from 50 V and to 1.5 times on US boats, nowhere else', () => {
    expect(practices['us-land'].nextSizeUp).toMatchObject({
      upToA: 800,
      maxFactor: undefined,
      basis: { status: 'from-memory' },
    });
    expect(practices['us-marine'].nextSizeUp).toMatchObject({ upToA: undefined, maxFactor: 1.5, fromV: 50 });
    expect(practices['iso-marine'].nextSizeUp).toBeUndefined();
    expect(practices['iec-land'].nextSizeUp).toBeUndefined();
  });

  it('drop limits: 3 % critical everywhere, 10 % otherwise on boats, 5 % on land', () => {
    expect(PRACTICES.map((practice) => practices[practice].dropCritical.value)).toEqual([0.03, 0.03, 0.03, 0.03]);
    expect(PRACTICES.map((practice) => practices[practice].dropOrdinary.value)).toEqual([0.05, 0.1, 0.1, 0.05]);
  });

  it('125 % of continuous current is a rule on US land and a habit elsewhere', () => {
    expect(PRACTICES.map((practice) => practices[practice].continuousFactor.value)).toEqual([1.25, 1.25, 1.25, 1.25]);
    expect(PRACTICES.map((practice) => practices[practice].continuousFactor.basis.status)).toEqual([
      'published',
      'common-practice',
      'common-practice',
      'common-practice',
    ]);
  });

  it.each([
    // 18 in at the battery is common practice where the book says as close as practicable.
    ['us-land', 0.457, 0.457, 0, 0],
    // 7 in and 72 in at the battery; 7 in and 40 in elsewhere.
    ['us-marine', 0.178, 1.829, 0.178, 1.016],
    ['iso-marine', 0.2, undefined, 0.2, undefined],
    ['iec-land', 3, undefined, 3, undefined],
  ] as const)(
    '%s: unprotected from the battery %s m open, %s m sheathed, elsewhere %s and %s',
    (practice, ...expected) => {
      const { unfusedFromBattery: battery, unfusedElsewhere: elsewhere } = practices[practice];
      const figures = [battery.openM, battery.sheathedM, elsewhere.openM, elsewhere.sheathedM];
      expect(figures.map((figure) => figure?.value)).toEqual(expected);
      expect([battery.words, elsewhere.words].every((words) => words.length > 10)).toBe(true);
    },
  );

  it.each([
    ['us-land', '12 AWG', '12 AWG', '1/0 AWG'],
    ['us-marine', '16 AWG', '18 AWG', undefined],
    ['iso-marine', '1 mm²', '0.75 mm²', undefined],
    ['iec-land', '1.5 mm²', '1.5 mm²', undefined],
  ] as const)('%s: smallest conductor %s alone, %s sheathed, %s in parallel', (practice, ...expected) => {
    const { smallestSingle, smallestSheathed, smallestParalleled } = practices[practice];
    const names = [smallestSingle, smallestSheathed, smallestParalleled].map((each) => each && sizeText(each.size));
    expect(names).toEqual(expected);
  });

  it('only the boat books ask for stranded copper, the small-craft standard from memory', () => {
    expect(practices['us-marine'].strandedCopperOnly?.text).toContain('183.425');
    expect(practices['iso-marine'].strandedCopperOnly?.status).toBe('from-memory');
    const asking = PRACTICES.filter((practice) => practices[practice].strandedCopperOnly !== undefined);
    expect(asking).toEqual(['us-marine', 'iso-marine']);
  });

  it('small copper wires have caps on US land only: 7, 10, 15, 20, 30 A', () => {
    const caps = practices['us-land'].smallWireCaps?.capsA;
    expect([18, 16, 14, 12, 10].map((gauge) => caps?.get(gauge))).toEqual([7, 10, 15, 20, 30]);
    expect(PRACTICES.filter((practice) => practices[practice].smallWireCaps !== undefined)).toEqual(['us-land']);
  });
});

describe('a malformed row is a defect', () => {
  const row = (header: string, line: string) => {
    const [first] = readRows('made-up.csv', `${header}\n${line}\n`);
    if (first === undefined) throw new Error('one row was written');
    return first;
  };
  it.each([
    ['value,source,status', 'twelve,SRC-IACS,published'],
    ['value,source,status', ',SRC-IACS,published'],
    ['value,source,status', '12,SRC-NOWHERE,published'],
    ['value,source,status', '12,SRC-IACS,rumour'],
    ['other,source,status', '12,SRC-IACS,published'],
  ])('%s / %s', (header, line) => {
    expect(() => figureOf(row(header, line), 'value')).toThrow('broken promise');
  });

  it('a size without its system', () => {
    expect(() => sizeOf(row('size', '6'))).toThrow('broken promise');
  });

  it('a table without the clause or the list of remembered cells that it should carry', () => {
    expect(() => clauseFigure(row('value,source,status', '12,SRC-IACS,published'), 'value')).toThrow('broken promise');
    expect(() => cellsOf(row('A1,source,status', '12,SRC-IACS,published'), ['A1'], 'mixed')).toThrow('broken promise');
  });
});
