/** What a short circuit asks of each fuse, breaker and cable: beside their schedules. */
import { type CableFigures, type DeviceFigures, shareUsed } from '../checks/protectionFigures.ts';
import { type Device, withoutPairs } from '../network/wiring.ts';
import type { Clearing } from '../protection/answer.ts';
import { timeText } from '../protection/clearing.ts';
import type { Citations } from './citations.ts';
import type { Cell, TableBlock } from './document.ts';
import { fixed, NOT_GIVEN, percent, plain } from './figures.ts';
import type { ReportInput } from './input.ts';
import { id, number, schedule, text } from './schedule.ts';
import { plainFields } from './wording.ts';

const AT_LEAST_A = 10;

/** Whole amperes: no fault is known closer. */
export function faultAmps(currentA: number): string {
  return fixed(currentA, currentA !== 0 && Math.abs(currentA) < AT_LEAST_A ? 1 : 0);
}

/** Nothing without a study, or where no source reaches any device. */
export function deviceFaultSchedule({ protection }: ReportInput, citations: Citations): readonly TableBlock[] {
  const devices = protection?.devices ?? [];
  const told = devices.filter(({ fault }) => fault !== null);
  const apart = devices.filter(({ fault }) => fault === null).map(({ device }) => device.id);
  const bands = told.flatMap(({ band }) => ('missing' in band ? [] : [band]));
  return schedule(
    'Overcurrent devices in a short circuit',
    [
      id('Device'),
      number('Highest', 'A'),
      number('Interrupts', 'A'),
      number('Margin', 'A'),
      number('Lowest', 'A'),
      text('Lowest at'),
      id('Open by'),
      text('Times from'),
      text('Device ahead'),
      number('Ratio', 'to 1'),
    ],
    told.map((one) => deviceRow(one, citations)),
    [
      'Highest: the most through the device in a fault right behind it. Margin: interrupt rating less the highest. Lowest: the least through it in a fault at the far end of what it protects. Open by: when it surely has opened at the lowest.',
      ...(told.some(({ upstream }) => upstream !== null)
        ? ['Device ahead: the nearest that serves more, and the ratio of the two ratings.']
        : []),
      ...(bands.some(({ from }) => from === 'generic')
        ? ['Generic: a band of the type, not of this device. Get the maker’s curve, and let it replace these times.']
        : []),
      ...(told.some(({ atLowest }) => atLowest?.beyond === true)
        ? ['≤ the current lies beyond the last point of the band; the time is the one there.']
        : []),
      ...(apart.length === 0 ? [] : [`Reached by no source: ${apart.join(', ')}.`]),
    ],
  )
    .map(filled)
    .map((table) => (told.length > DENSE_ROWS ? { ...table, dense: true } : table));
}

/** Columns that no row fills are left out. */
export function filled({ columns, rows, ...rest }: TableBlock): TableBlock {
  const used = columns.map((_, column) => rows.some((row) => row[column] !== ''));
  const kept = <T>(all: readonly T[]) => all.filter((_, column) => used[column]);
  return { ...rest, columns: kept(columns), rows: rows.map(kept) };
}

function deviceRow({ device, fault, band, atLowest, upstream }: DeviceFigures, citations: Citations): readonly Cell[] {
  const highestA = fault?.highestA ?? 0;
  const { interruptA } = device;
  return [
    fault?.fromBothSides === true ? { text: device.id, under: 'fed from both ends' } : device.id,
    faultAmps(highestA),
    interruptA === undefined ? NOT_GIVEN : plain(interruptA),
    interruptA === undefined ? NOT_GIVEN : faultAmps(interruptA - highestA),
    fault === null || fault.lowestA === null ? '' : faultAmps(fault.lowestA),
    fault?.lowestAt ?? '',
    fault?.lowestA === null ? '' : openBy(atLowest),
    timesFrom(device, band, citations),
    upstream === null ? '' : `${upstream.id}, ${plain(upstream.ratingA)} A`,
    upstream === null ? '' : fixed(upstream.ratingA / device.ratingA, 1),
  ];
}

function openBy(clearing: Clearing | null): string {
  if (clearing === null || clearing.clears === null) return NOT_GIVEN;
  if (clearing.clearS === null) return 'need not open';
  return `${clearing.beyond ? '≤ ' : ''}${timeText(Number(clearing.clearS.toPrecision(2)))}`.replaceAll(' ', '\u00a0');
}

function timesFrom(device: Device, band: DeviceFigures['band'], citations: Citations): Cell {
  if ('missing' in band) return device.type === undefined && device.kind === 'fuse' ? 'type not given' : 'not given';
  if (band.from === 'maker') return 'maker, as entered';
  return `generic, ${(device.type ?? '').replaceAll('_', ' ')} ${citations.short(band.basis)}`;
}

/** More cables than these, and those that are furthest from their limit are counted only. */
const MOST_CABLES = 60;
const THOUSAND = 1000;
/** Longer tables are set closer. */
const DENSE_ROWS = 8;

export function cableFaultSchedule({ job, protection }: ReportInput, citations: Citations): readonly TableBlock[] {
  const cables = [...(protection?.cables ?? [])];
  const left = cables.length - MOST_CABLES;
  if (left > 0) cables.sort((a, b) => shareUsed(b) - shareUsed(a));
  const isWhole = withoutPairs(job.parts).every(
    ({ id: of, kind }) => kind !== 'cable' || cables.some(({ cable }) => cable === of),
  );
  const assumed = [...new Set(cables.flatMap(({ withstand }) => withstand.assumed))].map(plainFields);
  const bases = [...new Set(cables.map(({ withstand }) => citations.mark(withstand.basis)))];
  return schedule(
    'Cables in a short circuit',
    [
      id('Cable'),
      id('Behind'),
      number('Stands', '1000 A²s'),
      number('Let through', '1000 A²s'),
      number('Used', '%'),
      number('At', 'A'),
    ],
    cables.slice(0, MOST_CABLES).map(cableRow),
    [
      `Stands: k²S² of all parallel conductors, ${bases.join(', ')}. Let through: the most I²t of the device for any fault from its lowest to its highest that it opens within 5 s, at the current beside it. “Not in 5 s”: no such fault surely opens it in that time.`,
      ...(assumed.length === 0 ? [] : [`Where the job does not say, taken: ${assumed.join(', ')}.`]),
      ...(isWhole
        ? []
        : ['Left out: cables without a device or a size, and those whose device’s times are not given.']),
      ...(left > 0 ? [`${String(left)} more cables, further from what they stand.`] : []),
    ],
  ).map((table) => (cables.length > DENSE_ROWS ? { ...table, dense: true } : table));
}

function cableRow({ cable, device, withstand, letThrough }: CableFigures): readonly Cell[] {
  const use = letThrough === null ? 0 : letThrough.i2t / withstand.k2s2;
  return [
    cable,
    device,
    heat(withstand.k2s2),
    letThrough === null ? 'not in 5 s' : heat(letThrough.i2t),
    letThrough === null ? '' : use < 0.001 ? '< 0.1' : percent(use),
    letThrough === null ? '' : faultAmps(letThrough.currentA),
  ];
}

/** Thousands of A²s, three digits. */
function heat(i2t: number): string {
  const thousands = i2t / THOUSAND;
  return fixed(Number(thousands.toPrecision(3)), thousands >= 100 ? 0 : thousands >= 10 ? 1 : 2);
}
