/**
 * The volt walk: the potential step by step from a source through a load and back. Two bands of one scale, the volts between them
 * left out and said so; the sentence over it is the answer; a step selects its part.
 */
import MenuItem from '@mui/material/MenuItem';
import Select from '@mui/material/Select';
import { type KeyboardEvent, type ReactElement, useEffect, useMemo, useRef, useState } from 'react';
import {
  type CheckedJob,
  caseById,
  fixedText,
  formatQuantity,
  type PartId,
  voltWalk,
  type VoltWalk as Walk,
  type WalkChoice,
  type WalkStep,
  walkChoices,
  walkLosses,
  walkRiseV,
} from '../../core/api.ts';
import { useView } from '../diagram/view.ts';
import { useOpenJob } from '../state/openJob.ts';
import { usePreferences } from '../state/preferences.ts';
import { type ChartStep, type WalkShape, walkShape } from './walkShape.ts';
import './voltWalk.css';

/** Sizes of the chart at the usual size of text, px; all of them grow with it. */
const HEIGHT = 132;
const AXIS = 64;
/** Drops that are named in the chart itself. */
const MOST_NAMED = 5;

export function VoltWalk(): ReactElement {
  const { job, answers, caseId, selection } = useOpenJob();
  const wanted = useView((view) => view.walkLoad);
  const point = answers?.points.get(caseId);
  const isFresh = answers?.job === job;
  const operatingCase = caseById(job, caseId);
  const choices = useMemo(
    () =>
      point === undefined || operatingCase === undefined || !isFresh ? [] : walkChoices({ job, point, operatingCase }),
    [job, point, operatingCase, isFresh],
  );
  const chosen = chooseLoad(choices, selection.parts, wanted);
  const walk = useMemo(() => {
    if (point === undefined || operatingCase === undefined || chosen === undefined || !isFresh) return undefined;
    return voltWalk({
      job,
      operatingCase,
      point,
      load: chosen.load,
      ...(chosen.source === null ? {} : { source: chosen.source }),
    });
  }, [job, operatingCase, point, chosen, isFresh]);
  const answer = walk === undefined ? undefined : walk.ok ? answerOf(walk, job) : walk.reason;
  return (
    <section className="volt-walk" aria-label="Volt walk">
      <div className="head">
        <h2>{answer ?? nothingYet(job, point?.outcome)}</h2>
        {choices.length > 0 && (
          <Select
            size="small"
            variant="standard"
            value={chosen?.load ?? ''}
            inputProps={{ 'aria-label': 'Walk to' }}
            onChange={({ target }) => useView.setState({ walkLoad: target.value })}
          >
            {choices.map(({ load }) => (
              <MenuItem key={load} value={load}>
                {`to ${nameOf(job, load)}`}
              </MenuItem>
            ))}
          </Select>
        )}
      </div>
      {walk?.ok === true && <Chart walk={walk} />}
      {walk?.ok === true && <WalkTable walk={walk} />}
    </section>
  );
}

/** The load that is selected, else the one chosen last, else the one that takes most. */
function chooseLoad(
  choices: readonly WalkChoice[],
  selected: readonly PartId[],
  wanted: PartId | null,
): WalkChoice | undefined {
  const most = choices.reduce<WalkChoice | undefined>(
    (best, one) => (best === undefined || one.currentA > best.currentA ? one : best),
    undefined,
  );
  return choices.find(({ load }) => selected.includes(load)) ?? choices.find(({ load }) => load === wanted) ?? most;
}

function nothingYet(job: CheckedJob, outcome: string | undefined): string {
  if (job.parts.length === 0) return 'The volt walk begins when a source feeds a load.';
  if (outcome === undefined) return 'Solving …';
  if (outcome === 'solved') return 'Nothing takes current in this case: no volts to walk along.';
  return 'This case has no operating point to walk through.';
}

function nameOf(job: CheckedJob, id: PartId): string {
  const label = job.parts.find((part) => part.id === id)?.label;
  return label === undefined || label === id ? id : `${id}, ${label}`;
}
/** Below this is rounding of the solve, not a drop. */
const LEAST_V = 0.00005;
const volts = (value: number, digits = 3): string =>
  formatQuantity({ value: Math.abs(value) < LEAST_V ? 0 : value, unit: 'V', digits }).replace(/^-/, '\u2212');

/** In one unit, so that the marks of an axis can be compared. */
function plainVolts(value: number): string {
  return `${fixedText({ value, decimals: 3, keepZeros: true })} V`.replace(/^-/, '\u2212');
}

/** `Of 25.1 V the inverter INV gets 24.4 V; cables take 0.5 V, joints 0.2 V.` */
function answerOf(walk: Walk, job: CheckedJob): string {
  const losses = walkLosses(walk, job)
    .filter(({ lostV }) => lostV >= 0.0005)
    .slice(0, 3)
    .map(
      ({ group, lostV }, index) =>
        `${group} ${index === 0 ? `${group === 'battery' ? 'takes' : 'take'} ` : ''}${volts(lostV, 2)}`,
    );
  const rest = losses.length === 0 ? 'nothing worth telling is lost' : losses.join(', ');
  return `Of ${volts(walkRiseV(walk))} at ${walk.source}${walk.totals.otherSourcesV === 0 ? '' : ' and what is in series'}, ${nameOf(job, walk.load)} gets ${volts(walk.totals.loadV)}; ${rest}.`;
}

function useWidth(): readonly [React.RefObject<HTMLDivElement | null>, number] {
  const ref = useRef<HTMLDivElement>(null);
  const [width, setWidth] = useState(0);
  useEffect(() => {
    const element = ref.current;
    if (element === null) return undefined;
    const observer = new ResizeObserver(() => setWidth(element.clientWidth));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}

/** The chart is laid out as for text of the usual size and drawn larger or smaller with the person's text. */
function Chart({ walk }: { readonly walk: Walk }): ReactElement {
  const [ref, widthPx] = useWidth();
  const textSize = usePreferences(({ textPercent }) => textPercent / 100);
  const width = widthPx / textSize;
  const shape = useMemo(
    () =>
      width < 120
        ? undefined
        : walkShape(walk, { left: AXIS, right: width - 8, top: 14, bottom: HEIGHT - 14, gap: 26 }),
    [walk, width],
  );
  return (
    <div ref={ref} className="chart" style={{ height: `${String(HEIGHT / USUAL_TEXT_PX)}rem` }}>
      {shape !== undefined && <Steps shape={shape} width={width} />}
    </div>
  );
}
/** Of browsers, before any preference. */
const USUAL_TEXT_PX = 16;

function Steps({ shape, width }: { readonly shape: WalkShape; readonly width: number }): ReactElement {
  const selected = useOpenJob(({ selection }) => selection.parts);
  const [at, setAt] = useState(0);
  const named = placeNames(shape.steps, width);
  const onKeyDown = (event: KeyboardEvent<SVGGElement>, { index, step }: ChartStep): void => {
    const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
    if (by !== 0) {
      event.preventDefault();
      const next = Math.min(shape.steps.length - 1, Math.max(0, index + by));
      setAt(next);
      event.currentTarget.ownerSVGElement?.querySelectorAll<SVGElement>('[role="button"]')[next]?.focus();
    } else if (event.key === 'Enter' || event.key === ' ') {
      event.preventDefault();
      selectStep(step);
    }
  };
  return (
    // biome-ignore lint/a11y/useSemanticElements: a chart has no fieldset
    <svg
      width="100%"
      height="100%"
      viewBox={`0 0 ${String(width)} ${String(HEIGHT)}`}
      preserveAspectRatio="xMinYMin meet"
      role="group"
      aria-label="Steps of the volt walk"
    >
      <Axis shape={shape} width={width} />
      {shape.steps
        .filter(({ step }) => selected.includes(ownerOf(step.part)))
        .map(({ index, x, width: column }) => (
          <rect key={index} className="lit" x={x} y={2} width={column} height={HEIGHT - 4} />
        ))}
      <path className="line" d={linePath(shape.steps)} />
      {shape.steps.map((each) => (
        <StepMark
          key={each.index}
          placed={each}
          name={named.get(each.index)}
          isSelected={selected.includes(ownerOf(each.step.part))}
          isStop={each.index === Math.min(at, shape.steps.length - 1)}
          onStop={() => setAt(each.index)}
          onKeyDown={(event) => onKeyDown(event, each)}
        />
      ))}
    </svg>
  );
}

/** The ends of each band, and that the scale is broken between them. */
function Axis({ shape: { bands }, width }: { readonly shape: WalkShape; readonly width: number }): ReactElement {
  return (
    <g className="axis" aria-hidden>
      {bands.map(({ top, bottom, highV, lowV }, index) => {
        const next = bands[index + 1];
        const isTall = bottom - top >= LINE;
        return (
          <g key={String(highV)}>
            <text x="56" y={(isTall ? top : (top + bottom) / 2) + 4} textAnchor="end">
              {plainVolts(highV)}
            </text>
            {isTall && (
              <text x="56" y={bottom + 4} textAnchor="end">
                {plainVolts(lowV)}
              </text>
            )}
            {next !== undefined && (
              <>
                <path d={`M62 ${String((bottom + next.top) / 2)}H${String(width)}`} className="break" />
                <text x="56" y={(bottom + next.top) / 2 + 4} textAnchor="end" className="quiet">
                  break
                </text>
              </>
            )}
          </g>
        );
      })}
    </g>
  );
}

function linePath(steps: readonly ChartStep[]): string {
  return steps
    .map(({ x, width, startY, endY }, index) => {
      const turn = x + width / 2;
      return `${index === 0 ? `M${String(x)} ${String(startY)}` : ''}H${String(turn)}V${String(endY)}H${String(x + width)}`;
    })
    .join('');
}

interface PlacedName {
  readonly text: string;
  readonly x: number;
  readonly y: number;
}
/** Mean width of a letter of the chart, px. */
const LETTER = 6.1;
const LINE = 13;

/** Names of the largest drops, the source and the load, each where no other name stands. */
function placeNames(steps: readonly ChartStep[], width: number): ReadonlyMap<number, PlacedName> {
  const drops = steps.filter(({ step }) => (step.kind === 'part' || step.kind === 'sag') && step.changeV < -0.0005);
  const largest = drops.toSorted((a, b) => a.step.changeV - b.step.changeV).slice(0, MOST_NAMED);
  const placed = new Map<number, PlacedName>();
  const taken: { readonly x1: number; readonly x2: number; readonly y: number }[] = [];
  for (const each of [...steps.filter(({ isAcross }) => isAcross), ...largest]) {
    const { step, x, width: column, startY, endY, isAcross, index } = each;
    const text = `${step.kind === 'sag' ? 'inside ' : ''}${step.part} ${volts(step.changeV, isAcross ? 3 : 2)}`;
    const long = text.length * LETTER;
    const middle = x + column / 2;
    const wanted = isAcross ? middle + 6 : middle - long / 2;
    const left = Math.min(Math.max(66, wanted), width - long - 4);
    const first = isAcross ? (startY + endY) / 2 + 4 : Math.max(startY, endY) + 12;
    const isFree = (y: number): boolean =>
      y > 10 &&
      y < HEIGHT - 2 &&
      taken.every((other) => Math.abs(other.y - y) >= LINE || other.x2 < left || other.x1 > left + long);
    const y = [
      first,
      first + LINE,
      Math.min(startY, endY) - 5,
      first + 2 * LINE,
      Math.min(startY, endY) - 5 - LINE,
    ].find(isFree);
    if (y === undefined) continue;
    taken.push({ x1: left, x2: left + long, y });
    placed.set(index, { text, x: left, y });
  }
  return placed;
}

function StepMark({
  placed,
  name,
  isSelected,
  isStop,
  onStop,
  onKeyDown,
}: {
  readonly placed: ChartStep;
  readonly name: PlacedName | undefined;
  readonly isSelected: boolean;
  readonly isStop: boolean;
  readonly onStop: () => void;
  readonly onKeyDown: (event: KeyboardEvent<SVGGElement>) => void;
}): ReactElement {
  const { step, x, width, startY, endY } = placed;
  const middle = x + width / 2;
  const words = wordsOf(step);
  return (
    // biome-ignore lint/a11y/useSemanticElements: a button of HTML cannot stand inside a chart
    <g
      role="button"
      tabIndex={isStop ? 0 : -1}
      aria-label={words}
      aria-pressed={isSelected}
      className={isSelected ? 'step chosen' : 'step'}
      onFocus={onStop}
      onKeyDown={onKeyDown}
      onClick={() => selectStep(step)}
    >
      <title>{words}</title>
      <rect x={x} y={2} width={width} height={HEIGHT - 4} />
      <path
        d={`M${String(middle)} ${String(startY)}V${String(endY)}`}
        className={step.kind === 'part' ? 'drop' : step.kind}
      />
      {name !== undefined && (
        <text x={name.x} y={name.y} textAnchor="start">
          {name.text}
        </text>
      )}
    </g>
  );
}

function wordsOf({ kind, side, part, from, to, changeV, endV }: WalkStep): string {
  const what = kind === 'sag' ? `inside ${part}` : part;
  const where = from !== null && to !== null ? `, ${from} to ${to}` : '';
  const way = side === 'back' ? ' on the way back' : side === 'out' ? ' on the way out' : '';
  return `${what}${where}${way}: ${volts(changeV)}, then ${volts(endV, 4)}`;
}

/** A cable of a run is drawn and selected with its run. */
function ownerOf(part: PartId): PartId {
  const { job } = useOpenJob.getState();
  return job.parts.some(({ id }) => id === part) ? part : (part.replace(/\.(?:plus|minus)$/, '') as PartId);
}
function selectStep({ part }: WalkStep): void {
  useOpenJob.getState().select({ parts: [ownerOf(part)] });
}

/** The same in a table, for those who hear the page. */
function WalkTable({ walk }: { readonly walk: Walk }): ReactElement {
  return (
    <div className="only-read">
      <table>
        <caption>Volt walk, step by step</caption>
        <thead>
          <tr>
            <th scope="col">Part</th>
            <th scope="col">From</th>
            <th scope="col">To</th>
            <th scope="col">Change</th>
            <th scope="col">Potential after it</th>
          </tr>
        </thead>
        <tbody>
          {walk.steps.map((step, index) => (
            <tr key={String(index)}>
              <th scope="row">{step.kind === 'sag' ? `inside ${step.part}` : step.part}</th>
              <td>{step.from ?? 'inside'}</td>
              <td>{step.to ?? 'inside'}</td>
              <td>{volts(step.changeV)}</td>
              <td>{volts(step.endV, 4)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
