/** What the answer of the shown case says about each part and junction, in words and figures for the drawing. */
import { create } from 'zustand';
import type { CheckedJob, JunctionId, OperatingPoint, Part, PartId, Severity } from '../../core/api.ts';
import { formatQuantity, KIND_WORDS, ratingWords, SEVERITIES } from '../../core/api.ts';
import { type OpenJob, useOpenJob } from '../state/openJob.ts';

export interface LiveCurrent {
  /** Positive as the part counts it; null where the network leaves it open. */
  readonly currentA: number | null;
  readonly text: string;
}
export interface LivePart {
  /** The line under the part. */
  readonly line: string;
  /** Volts at its own poles. */
  readonly volts: string;
  /** `off`, `open`, `unfed` … where it says something. */
  readonly state: string;
  /** Carries nothing: drawn in grey. */
  readonly isDead: boolean;
  readonly isOpen: boolean;
  /** By wire: `through`, `plus`, `minus`, `input`, `output`. */
  readonly currents: Readonly<Record<string, LiveCurrent>>;
  readonly severity: Severity | null;
  readonly spoken: string;
}
export interface Live {
  readonly parts: ReadonlyMap<PartId, LivePart>;
  readonly volts: ReadonlyMap<JunctionId, string>;
  readonly largestA: number;
  /** Belongs to an earlier state of the drawing; new answers are on their way. */
  readonly isOld: boolean;
}

export const useLive = create<Live>()(() => ({ parts: new Map(), volts: new Map(), largestA: 0, isOld: false }));

/** Answers come within a few frames; only figures that have stood longer than this beside a newer drawing are shown as old, ms. */
const OLD_AFTER_MS = 400;

/** Follows the open job for as long as the drawing is shown. */
export function followAnswers(): () => void {
  let growingOld: ReturnType<typeof setTimeout> | undefined;
  refresh(useOpenJob.getState());
  const stop = useOpenJob.subscribe((now, before) => {
    if (now.answers !== before.answers || now.caseId !== before.caseId) {
      clearTimeout(growingOld);
      refresh(now);
    } else if (now.job !== before.job) {
      clearTimeout(growingOld);
      growingOld = setTimeout(() => refresh(useOpenJob.getState()), OLD_AFTER_MS);
    }
  });
  return () => {
    clearTimeout(growingOld);
    stop();
  };
}

function refresh({ job, answers, caseId, generation }: OpenJob): void {
  const answer = answers?.points.get(caseId);
  // A case without an operating point has no volts or amps to show.
  const point = answer?.outcome === 'collapse' ? undefined : answer;
  const asking = answer?.collapse?.load;
  const before = useLive.getState();
  const severities = severitiesOf(answers?.report.findings ?? []);
  const parts = new Map(
    (job.parts ?? []).map((part) => {
      const severity = severities.get(part.id) ?? null;
      const now = part.id === asking ? askingTooMuch(part, severity) : livePart(part, point, severity);
      const old = before.parts.get(part.id);
      return [part.id, old !== undefined && JSON.stringify(old) === JSON.stringify(now) ? old : now];
    }),
  );
  useLive.setState({
    parts,
    volts: voltsOf(point),
    largestA: largestOf(job, point),
    isOld: answers !== null && answers.generation !== generation,
  });
}

function voltsOf(point: OperatingPoint | undefined): ReadonlyMap<JunctionId, string> {
  return new Map(
    [...(point?.junctions ?? [])].map(([id, volts]) => [id, volts === null ? 'no volts' : voltText(volts)]),
  );
}

function largestOf(job: CheckedJob, point: OperatingPoint | undefined): number {
  const amps = (job.parts ?? []).flatMap((part) => {
    const ids: readonly string[] = part.kind === 'pair' ? [`${part.id}.plus`] : [part.id];
    return ids.map((id) => Math.abs(point?.parts.get(id as PartId)?.currentA ?? 0));
  });
  return Math.max(0, ...amps);
}

/** The worst verdict on each part, in whatever case. */
function severitiesOf(
  findings: readonly { readonly severity: Severity; readonly parts: readonly PartId[]; readonly case: string | null }[],
): ReadonlyMap<PartId, Severity> {
  const worst = new Map<PartId, Severity>();
  for (const { severity, parts } of findings) {
    for (const id of parts) {
      const part = id.replace(/\.(?:plus|minus)$/, '') as PartId;
      const now = worst.get(part);
      if (now === undefined || SEVERITIES.indexOf(severity) < SEVERITIES.indexOf(now)) worst.set(part, severity);
    }
  }
  return worst;
}

export function ampText(currentA: number | null | undefined): string {
  if (currentA === undefined) return '';
  if (currentA === null) return '? A';
  // Below a milliampere is rounding of the solve, not a current.
  const value = Math.abs(currentA) < 0.001 ? 0 : Math.abs(currentA);
  return formatQuantity({ value, unit: 'A', digits: 3 });
}
export function voltText(volts: number): string {
  const digits = Math.abs(volts) < 1 ? 3 : 4;
  return formatQuantity({ value: Math.abs(volts) < 0.00005 ? 0 : volts, unit: 'V', digits }).replace(/^-/, '\u2212');
}
function wattText(value: number): string {
  return formatQuantity({ value, unit: 'W', digits: 3 });
}

const DEAD_STATES: readonly string[] = ['off', 'open', 'unfed', 'dropped-out', 'blocking', 'idle', 'dark'];
const STATE_WORDS: Readonly<Record<string, string>> = {
  'dropped-out': 'dropped out',
  'current-limited': 'at its amp limit',
  'voltage-held': 'holding its volts',
  conducting: '',
  tracking: 'tracking',
  direct: 'direct',
};

function livePart(part: Part, point: OperatingPoint | undefined, severity: Severity | null): LivePart {
  const currents = currentsOf(part, point);
  const known = Object.values(currents);
  const answer = point?.parts.get(part.id);
  const rawState = answer?.state ?? '';
  const isDead =
    point !== undefined &&
    (DEAD_STATES.includes(rawState) ||
      (known.length > 0 && known.every(({ currentA }) => currentA !== null && Math.abs(currentA) < 0.001)));
  const state = STATE_WORDS[rawState] ?? rawState;
  const drawnOpen = 'state' in part && part.state === 'open';
  const line = lineOf(part, point, currents);
  const dead = isDead && state === '' && part.kind !== 'busbar' ? 'no current' : state;
  return {
    line,
    volts: 'plus' in part && answer?.voltageV != null ? voltText(answer.voltageV) : '',
    state: dead,
    isDead,
    isOpen: point === undefined ? drawnOpen : rawState === 'open',
    currents,
    severity,
    spoken: spokenOf(part, currents, dead, severity),
  };
}

/** The load for which there is no operating point. */
function askingTooMuch(part: Part, severity: Severity | null): LivePart {
  const state = 'asks for more than can be delivered';
  return {
    ...livePart(part, undefined, severity),
    state: 'asks too much',
    spoken: spokenOf(part, {}, state, severity),
  };
}

function currentsOf(part: Part, point: OperatingPoint | undefined): Readonly<Record<string, LiveCurrent>> {
  if (point === undefined) return {};
  const current = (value: number | null | undefined): LiveCurrent => ({
    currentA: value ?? null,
    text: ampText(value ?? null),
  });
  if (part.kind === 'pair') {
    return {
      plus: current(point.parts.get(`${part.id}.plus` as PartId)?.currentA),
      minus: current(point.parts.get(`${part.id}.minus` as PartId)?.currentA),
    };
  }
  const answer = point.parts.get(part.id);
  if (answer === undefined) return {};
  if (part.kind === 'controller' || part.kind === 'converter') {
    return { input: current(answer.inputA), output: current(answer.outputA) };
  }
  return { through: current(answer.currentA) };
}

function lineOf(
  part: Part,
  point: OperatingPoint | undefined,
  currents: Readonly<Record<string, LiveCurrent>>,
): string {
  const answer = point?.parts.get(part.id);
  const through = currents['through'];
  switch (part.kind) {
    case 'string': {
      if (answer === undefined || through === undefined) return '';
      const way = (through.currentA ?? 0) < -0.001 ? 'takes' : 'gives';
      return `${way} ${through.text}`;
    }
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger': {
      if (answer === undefined || through === undefined) return '';
      const watts = answer.powerW === null || answer.powerW === 0 ? '' : ` · ${wattText(answer.powerW)}`;
      return `${through.text}${watts}`;
    }
    case 'controller':
    case 'converter':
      return answer === undefined ? '' : `${currents['input']?.text ?? ''} in · ${currents['output']?.text ?? ''} out`;
    case 'busbar':
      return through === undefined || through.currentA === 0 ? '' : `${through.text} at most`;
    case 'bond':
    case 'pair':
    case 'cable':
      return '';
    default:
      return through?.text ?? '';
  }
}

const SEVERITY_SPOKEN: Readonly<Record<Severity, string>> = {
  stop: 'has a finding to stop for',
  fix: 'has a finding to fix',
  look: 'has a finding to look at',
  note: 'has a note',
};

/** `Fuse F3, main fuse, 60 A, carries 41.2 A from A+ to BAR`. */
function spokenOf(
  part: Part,
  currents: Readonly<Record<string, LiveCurrent>>,
  state: string,
  severity: Severity | null,
): string {
  const word = KIND_WORDS[part.kind];
  const label = part.label === undefined || part.label === part.id ? [] : [part.label];
  const rating = ratingWords(part);
  const carries = spokenCurrent(part, currents);
  const kept = [
    `${word.charAt(0).toUpperCase()}${word.slice(1)} ${part.id}`,
    ...label,
    rating,
    carries,
    state === 'no current' && carries !== '' ? '' : state,
    severity === null ? '' : SEVERITY_SPOKEN[severity],
  ];
  return kept.filter((words) => words !== '').join(', ');
}

function spokenCurrent(part: Part, currents: Readonly<Record<string, LiveCurrent>>): string {
  const through = currents['through'] ?? currents['plus'];
  if (currents['input'] !== undefined)
    return `takes ${currents['input'].text}, gives ${currents['output']?.text ?? ''}`;
  if (through === undefined) return '';
  if (through.currentA === null) return 'current not determined';
  const back = through.currentA < 0;
  if ('plus' in part) {
    const isSource = part.kind === 'string' || part.kind === 'array' || part.kind === 'charger';
    return `${isSource !== back ? 'gives' : 'takes'} ${through.text} between ${part.plus} and ${part.minus}`;
  }
  if (part.kind === 'busbar') return `carries at most ${through.text}`;
  if (!('from' in part)) return '';
  const [from, to] =
    typeof part.from === 'string'
      ? [part.from, part.to as string]
      : [part.from.plus, (part.to as { plus: string }).plus];
  return back ? `carries ${through.text} from ${to} to ${from}` : `carries ${through.text} from ${from} to ${to}`;
}
