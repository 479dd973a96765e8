/**
 * Acceptance scenario S13 (`data/scenarios.json`: inputs, expected values and tolerances worked out beforehand by a script that
 * shares nothing with the engine): volts along the blocks of one string, from readings.
 */
import { describe, expect, it } from 'vitest';
import { parseJob, type SeriesImbalance, seriesOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { closePage, inputsOf, ScenarioPage } from './scenariosBook.ts';
import { jobText } from './scenariosSolve.ts';

const flooded = { kind: 'string', chemistry: 'flooded', blockNominalV: 12, capacityAh: 200 };

function seriesIn(draft: Readonly<Record<string, unknown>>): SeriesImbalance {
  const parsed = parseJob(jobText(draft));
  if (!parsed.ok) throw new Error(parsed.issues.map(({ message }) => message).join('\n'));
  const [one, ...others] = seriesOf({ job: parsed.value, tables, points: [] });
  if (one === undefined || others.length > 0) throw new Error('one string was read');
  return one;
}

describe('S13, hill farm: series imbalance of a 24 V and a 48 V bank', () => {
  const page = new ScenarioPage('S13');
  const inputs = inputsOf('S13') as { '24V': readonly [number, number]; '48V_from_negative': readonly number[] };

  it('24 V: one string with a midpoint, its two halves read', () => {
    const [lowerV, upperV] = inputs['24V'];
    const voltage = { quantity: 'voltage' };
    const { midpoint, remarks } = seriesIn({
      parts: [{ ...flooded, id: 'bank', blocksInSeries: 2, minus: 'neg', plus: 'pos', midpoint: 'mid' }],
      readings: [
        { ...voltage, id: 'lower', plus: 'mid', minus: 'neg', valueV: lowerV },
        { ...voltage, id: 'upper', plus: 'pos', minus: 'mid', valueV: upperV },
      ],
    });
    page.hold('24 V deviation, on total', 100 * midpoint!.onTotal);
    page.hold('24 V deviation, on mean half', 100 * midpoint!.onMeanHalf);
    page.hold('24 V difference', 1000 * midpoint!.differenceV);
    // "Print the base of the percentage: the same reading is 2.2 % or 4.3 %."
    expect(remarks.join(' ')).toMatch(/2\.2 % of the total.*4\.3 % of the mean half/);
  });

  it('48 V: four blocks in series, each read', () => {
    const blocksV = inputs['48V_from_negative'];
    const { blocks, midpoint, remarks } = seriesIn({
      parts: blocksV.map((_, at) => ({
        ...flooded,
        id: `block ${at + 1}`,
        blocksInSeries: 1,
        minus: `at ${at}`,
        plus: `at ${at + 1}`,
      })),
      readings: blocksV.map((valueV, at) => ({
        id: `reading ${at + 1}`,
        quantity: 'voltage',
        plus: `at ${at + 1}`,
        minus: `at ${at}`,
        valueV,
      })),
    });
    page.hold('48 V midpoint deviation on total', 100 * midpoint!.onTotal);
    page.hold('48 V block 3 from mean', 1000 * blocks[2]!.fromMeanV);
    page.hold('48 V block 4 from mean', 1000 * blocks[3]!.fromMeanV);
    // "Midpoint looks perfect (-0.10 %) while blocks 3 and 4 are 0.7 V out: ask for block readings."
    expect(remarks.join(' ')).toMatch(
      /midpoint looks right \(0\.10 % of the total\) while block 3 .*block 4 .*every block/,
    );
  });

  closePage(page);
});
