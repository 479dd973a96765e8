/** All that stands behind each fuse and breaker, on the sloop with its four seeded troubles. */
import { describe, expect, test } from 'vitest';
import { checkJob, type DeviceStudy, type Draft, protectionStudy, runChecks } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';

const text = examples.find(({ name }) => name === 'sloop-with-seeded-trouble')?.text ?? '';
const read = checkJob(JSON.parse(text) as Draft);
if (!read.ok) throw new Error('the example can be read');
const job = read.value;
const plain = protectionStudy({ job, tables, method: 'plain' });
const of = (id: string): DeviceStudy => {
  const found = plain.devices.find((device) => device.id === id);
  if (found === undefined) throw new Error(`the sloop has ${id}`);
  return found;
};

describe('the study of protection', () => {
  test('every fuse and breaker has its row, and no highest fault lies below its lowest', () => {
    const drawn = job.parts.filter(({ kind }) => kind === 'fuse' || kind === 'breaker').map(({ id }) => id);
    expect(plain.devices.map(({ id }) => id)).toEqual(drawn);
    for (const { fault } of plain.devices) expect(fault?.highestA).toBeGreaterThanOrEqual(fault?.lowestA ?? 0);
  });

  test('the panel fuse lies before the breaker of the cabin lights, which may not open alone: 60 A over 60 A', () => {
    const { upstream } = of('B-4');
    expect(upstream).toMatchObject({ device: 'F-PAN', selectivity: { selective: false, ratio: 1 } });
  });

  test('the breaker over the thin cable lies outside its window, the bank fuse inside', () => {
    expect(of('B-4').window).toMatchObject({ fits: false, fuseA: 60, cable: 'W-CABIN.plus' });
    expect(of('F-H1').window).toMatchObject({ fits: true });
  });

  test('the inverter takes more than the rating through its fuse while it starts', () => {
    const [surge] = of('F-INV').surges;
    expect(surge?.part).toBe('INV');
    expect(surge?.currentA).toBeGreaterThan(of('F-INV').ratingA);
  });

  test('what it lets through is more than its thin return stands, as the check finds', () => {
    const { letThrough, withstand } = of('F-INV');
    expect(withstand?.cable).toBe('W-INV.minus');
    const finding = runChecks({ job, tables }).findings.find(
      ({ rule, parts }) => rule === 'cable-cooks' && parts[0] === 'F-INV',
    );
    expect(letThrough?.i2t).toBeCloseTo(finding?.measured.value ?? 0, 3);
    expect(withstand?.k2s2).toBeCloseTo(finding?.limit.value ?? 0, 3);
  });

  test('the other method gives other faults, and says which it is', () => {
    const iec = protectionStudy({ job, tables, method: 'iec-61660' });
    expect([plain.method, iec.method]).toEqual(['plain', 'iec-61660']);
    const highest = iec.devices.find(({ id }) => id === 'F-H1')?.fault?.highestA ?? 0;
    expect(highest).not.toBeCloseTo(of('F-H1').fault?.highestA ?? 0, 0);
  });
});
