/** The rows of the chemistry tables: every source is written up, a bad row is a defect. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { byChemistry, readRows } from '../../data/chemistry/rows.ts';

const folder = new URL('../../data/chemistry/', import.meta.url);

describe('chemistry tables', () => {
  it('every source of a row stands in data/SOURCES.md', () => {
    const written = readFileSync(new URL('../../data/SOURCES.md', import.meta.url), 'utf8');
    const tables = readdirSync(folder).filter((name) => name.endsWith('.csv'));
    expect(tables.length).toBeGreaterThanOrEqual(14);
    const rows = tables.flatMap((name) => readRows(name, readFileSync(new URL(name, folder), 'utf8')));
    const named = new Set(rows.map((row) => row.text('source')));
    expect(named.size).toBeGreaterThan(40);
    expect([...named].filter((source) => !written.includes(`| ${source} |`))).toEqual([]);
  });

  const sources = new Map([['SRC-BAT-X', 'a source']]);

  it.each([
    ['a number that is none', 'chemistry,value,source,status\nagm,1.2x,SRC-BAT-X,published\n'],
    ['an empty number', 'chemistry,value,source,status\nagm,,SRC-BAT-X,published\n'],
    ['a chemistry that is none', 'chemistry,value,source,status\npotato,1,SRC-BAT-X,published\n'],
    ['a source that is not listed', 'chemistry,value,source,status\nagm,1,SRC-BAT-Y,published\n'],
    ['a status that is none', 'chemistry,value,source,status\nagm,1,SRC-BAT-X,certain\n'],
    ['a missing column', 'chemistry,source,status\nagm,SRC-BAT-X,published\n'],
    ['a row with too many cells', 'chemistry,value,source,status\nagm,1,SRC-BAT-X,published,more\n'],
  ])('%s is a defect that names the table', (_what, csv) => {
    const read = () =>
      readRows('x.csv', csv).map((row) => [row.chemistry(), row.number('value'), row.basis(sources)] as const);
    expect(read).toThrow(Defect);
    expect(read).toThrow('x.csv');
  });

  it('a good row is read', () => {
    const rows = readRows('x.csv', 'chemistry,value,source,status\nagm,1.5,SRC-BAT-X,published\n');
    const values = byChemistry(rows, (own) => own.map((row) => row.number('value')));
    expect(values.agm).toEqual([1.5]);
    expect(values.lfp).toEqual([]);
    expect(rows[0]!.basis(sources)).toEqual({ source: 'SRC-BAT-X', text: 'a source', status: 'published' });
  });
});
