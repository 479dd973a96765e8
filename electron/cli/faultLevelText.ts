/** What `faultlevel` prints for a person. */
import { type DeviceFaultRow, type FaultMethod, fixedText, type JunctionFaultRow, numberText } from '../../core/api.ts';
import { caution } from './checkText.ts';
import type { FaultLevels } from './faultLevelAnswer.ts';
import { listItem, type TextColumn, textTable, wrapped } from './textTable.ts';

const none = '—';
const methodWords: Readonly<Record<FaultMethod, string>> = {
  plain: 'Method: plain. Volts over resistance, with the figures as entered.',
  'iec-61660':
    'Method: iec-61660. Battery branch of IEC 61660-1: 0.9 of the battery’s resistance at the first instant, 0.95 of its volts once settled.',
};
const sidesWords =
  'Highest: every source of the case, conductors at 20 °C, chargers and the like at their rated output. Lowest: low volts and high ' +
  'resistance of the bank that sends least, conductors hot, chargers nothing. A bolted fault: no arc, no resistance in the fault itself.';

export function faultLevelText(levels: FaultLevels): string {
  const { job, method, studies, summary } = levels;
  const { poles, earth, devices } = summary;
  const isIec = method === 'iec-61660';
  const cases = studies.map((study) => study.case).join(', ');
  const assumed = [...new Set(studies.flatMap((study) => study.assumed))];
  return [
    `${job.title}\n`,
    wrapped(`${methodWords[method]} ${sidesWords}`) + wrapped(`Cases: ${cases}.`),
    poles.length === 0
      ? 'No source of the job reaches any junction.\n'
      : junctionText('Fault between poles', poles, isIec),
    earth.length === 0 ? '' : junctionText('Fault to earth', earth, isIec),
    deviceText(devices),
    assumed.length === 0 ? '' : `Assumed:\n${assumed.map((text) => listItem(text)).join('')}`,
    wrapped(caution),
  ]
    .filter((text) => text !== '')
    .join('\n');
}

const left = (head: string): TextColumn => ({ head, align: 'left' });
const right = (head: string): TextColumn => ({ head, align: 'right' });
const amps = (value: number | null | undefined): string =>
  value === null || value === undefined ? none : fixedText({ value, decimals: value < 100 ? 1 : 0, keepZeros: true });

function junctionText(title: string, rows: readonly JunctionFaultRow[], isIec: boolean): string {
  const settled = isIec ? [right('settled A')] : [];
  const columns = [left('junction'), left('to'), right('highest A'), ...settled, right('lowest A'), right('source mΩ')];
  const across = rows.filter(({ samePole }) => !samePole);
  const within = rows.filter(({ samePole }) => samePole).map(({ junction }) => junction);
  const cells = across.map(({ junction, to, highest, lowest }) => [
    junction,
    to,
    amps(highest?.current.firstA),
    ...(isIec ? [amps(highest?.current.settledA)] : []),
    amps(lowest?.current.settledA),
    highest === null ? none : numberText({ value: 1000 * highest.current.sourceOhm }),
  ]);
  const rest = within.length === 0 ? '' : wrapped(`In the pole that these are shorted to: ${within.join(', ')}.`);
  return `${title}\n${textTable(columns, cells)}${rest}`;
}

function deviceText(rows: readonly DeviceFaultRow[]): string {
  if (rows.length === 0) return '';
  const columns = [
    left('device'),
    right('highest A'),
    right('interrupts A'),
    left('enough'),
    right('lowest A'),
    left('at'),
    left('opens'),
    left('fed from'),
  ];
  const cells = rows.map(({ id, interruptA, ok, clearing, fault }) => [
    id,
    amps(fault?.highestA),
    interruptA === null ? 'not given' : numberText({ value: interruptA }),
    ok === null ? none : ok ? 'yes' : 'NO',
    amps(fault?.lowestA),
    fault?.lowestAt ?? none,
    opensText(clearing?.clears ?? null, clearing?.clearS ?? null),
    fault === null ? 'no source' : fault.fromBothSides ? 'both ends' : 'one end',
  ]);
  const notes = rows.flatMap(({ id, clearing }) => (clearing === null ? [] : [listItem(`${id}: ${clearing.text}`)]));
  const how = notes.length === 0 ? '' : `\nAt the lowest fault\n${notes.join('')}`;
  return `Through each fuse and breaker\n${textTable(columns, cells)}${how}`;
}

function opensText(clears: boolean | null, clearS: number | null): string {
  if (clears === false) return 'may not';
  return clears === null || clearS === null ? none : `by ${numberText({ value: clearS, digits: 2 })} s`;
}
