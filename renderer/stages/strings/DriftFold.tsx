/** Hours to months of a cycle, each string with a charge of its own: who works more, who ends lower. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import {
  type CheckedJob,
  type CycleStep,
  type DriftedString,
  type DriftRequest,
  type DriftStudy,
  formatQuantity,
  wholeFigureText,
} from '../../../core/api.ts';
import { DriftChart, type DriftLine } from '../../charts/DriftChart.tsx';
import { SmallButton } from '../../controls/AskRow.tsx';
import { ChoiceField } from '../../controls/ChoiceField.tsx';
import { CountField } from '../../controls/CountField.tsx';
import { Figure } from '../../controls/Figure.tsx';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { Assumed, Quiet, Said } from '../../controls/Prose.tsx';
import { QuantityField } from '../../controls/QuantityField.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { caseWords } from '../../ledger/chosenCase.ts';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import { changeStringsView, useStringsView } from './stringsView.ts';
import { useStudy } from './studies.ts';
import { type Tags, tagOf } from './tags.ts';
import { percent } from './words.ts';

export interface DriftFoldProps {
  readonly job: CheckedJob;
  readonly tags: Tags;
  readonly usual: DriftRequest | null;
}

/** Events that are listed. */
const MOST_EVENTS = 8;
/** A year of daily cycles. */
const MOST_CYCLES = 366;
const MOST_HOURS = 10_000;

export function DriftFold({ job, tags, usual }: DriftFoldProps): ReactElement {
  const view = useStringsView();
  const known = new Set(['at-rest', ...job.cases.map(({ id }) => id)]);
  const asked = view.drift?.cycle.every((step) => known.has(step.case)) === true ? view.drift : usual;
  const study = useStudy('drift', asked, false);
  return (
    <Fold
      name="drift"
      title="Drift"
      answer={study.answer === null ? 'what days to months of use do to each string' : inShort(study.answer, tags)}
    >
      {asked === null ? (
        <Quiet>
          There is no case in which the bank gives and none in which it is charged: add one in the wiring, and a cycle
          can be run.
        </Quiet>
      ) : (
        <>
          <CycleForm job={job} request={asked} />
          <StudyPlace
            study={study}
            doing={`Running ${String(asked.cycles)} cycles`}
            begin={`Run ${asked.cycles === 1 ? 'one cycle' : `${String(asked.cycles)} cycles`}`}
          >
            {(drift) => <Drift drift={drift} tags={tags} />}
          </StudyPlace>
        </>
      )}
    </Fold>
  );
}

function inShort({ strings, cycles }: DriftStudy, tags: Tags): string {
  const [lowest] = strings.toSorted((a, b) => a.endCharge - b.endCharge);
  const [highest] = strings.toSorted((a, b) => b.endCharge - a.endCharge);
  if (lowest === undefined || highest === undefined) return '';
  const isAlike = highest.endCharge - lowest.endCharge < SAME_CHARGE;
  const after = cycles === 1 ? 'after one cycle' : `after ${String(cycles)} cycles`;
  if (isAlike) return `${after} each holds ${percent(highest.endCharge)}`;
  return `${after} ${nameOf(highest, tags)} holds ${percent(highest.endCharge)}, ${nameOf(lowest, tags)} ${percent(lowest.endCharge)}`;
}

/** `C`, or `C upper` for a half of it. */
function nameOf({ id, half }: DriftedString, tags: Tags): string {
  return half === null ? tagOf(tags, id) : `${tagOf(tags, id)} ${half}`;
}

type Alike = (a: DriftedString, b: DriftedString) => boolean;
/** Charges nearer to each other than this all the way lie on one another in a chart. */
const SAME_CHARGE = 0.005;
const BY_STRING: Alike = (a, b) => a.id === b.id;
const TOGETHER: Alike = () => true;

/** Strings, or halves of them, that do the same all the way told as one, among those that may be. */
function merged({ strings, moments }: DriftStudy, tags: Tags, may: Alike): readonly DriftLine[] {
  const isSame = (a: number, b: number): boolean =>
    moments.every(({ stateOfCharge }) => Math.abs((stateOfCharge[a] ?? 0) - (stateOfCharge[b] ?? 0)) < SAME_CHARGE);
  const groups: number[][] = [];
  strings.forEach((one, at) => {
    const group = groups.find(([first = 0]) => may(strings[first] ?? one, one) && isSame(first, at));
    if (group === undefined) groups.push([at]);
    else group.push(at);
  });
  return groups.map((group) => {
    const inIt = group.flatMap((at) => strings[at] ?? []);
    const names = inIt.map((one) => {
      const isWhole = one.half === null || inIt.filter(({ id }) => id === one.id).length > 1;
      return isWhole ? tagOf(tags, one.id) : nameOf(one, tags);
    });
    return { at: group[0] ?? 0, tag: [...new Set(names)].join(', '), hatch: tags.get(inIt[0]?.id ?? '')?.hatch ?? 0 };
  });
}

function CycleForm({ job, request }: { readonly job: CheckedJob; readonly request: DriftRequest }): ReactElement {
  const change = (part: Partial<DriftRequest>): null => {
    changeStringsView({ drift: { ...request, ...part } });
    return null;
  };
  const setStep = (at: number, part: Partial<CycleStep>): null =>
    change({ cycle: request.cycle.map((step, index) => (index === at ? { ...step, ...part } : step)) });
  const cases = [...new Set(['at-rest', ...job.cases.map(({ id }) => id)])];
  const words = (id: string): string => {
    const one = job.cases.find((operatingCase) => operatingCase.id === id);
    return one === undefined ? 'At rest, all off' : caseWords(one);
  };
  return (
    <Cycle>
      <ol>
        {request.cycle.map((step, index) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: a step of a cycle is its place in it
          <li key={index}>
            <ChoiceField
              label={`Case of step ${String(index + 1)}`}
              hideLabel
              value={step.case}
              required
              of={cases}
              words={words}
              onCommit={(chosen) => (chosen === undefined ? null : setStep(index, { case: chosen }))}
            />
            <QuantityField
              label={`Hours of step ${String(index + 1)}`}
              hideLabel
              unit="h"
              given={step.hours}
              required
              onCommit={(_, hours) =>
                hours === undefined || !(hours > 0 && hours <= MOST_HOURS)
                  ? 'How many hours does it last?'
                  : setStep(index, { hours })
              }
            />
            <SmallButton
              type="button"
              disabled={request.cycle.length === 1}
              onClick={() => change({ cycle: request.cycle.filter((_, place) => place !== index) })}
            >
              Remove<span className="only-read"> step {index + 1}</span>
            </SmallButton>
          </li>
        ))}
      </ol>
      <div style={{ display: 'flex', flexWrap: 'wrap', gap: '0.5rem 1rem', alignItems: 'center' }}>
        <SmallButton
          type="button"
          onClick={() => change({ cycle: [...request.cycle, { case: cases[0] ?? 'at-rest', hours: 8 }] })}
        >
          Add a step
        </SmallButton>
        <div style={{ width: '16rem' }}>
          <CountField
            label="How many cycles"
            value={request.cycles}
            required
            onCommit={(cycles) =>
              cycles === undefined || cycles < 1 || cycles > MOST_CYCLES
                ? `From 1 to ${String(MOST_CYCLES)}.`
                : change({ cycles })
            }
          />
        </div>
      </div>
    </Cycle>
  );
}

const Cycle = styled('div')({
  maxWidth: '40rem',
  marginBottom: '0.5rem',
  '& ol': { margin: 0, paddingInlineStart: '1.25rem' },
  '& li > *': { verticalAlign: 'top' },
  '& li': { paddingBlock: '0.0625rem' },
  '& li > div:nth-of-type(1)': { display: 'inline-block', width: 'min(22rem, 100%)' },
  '& li > div:nth-of-type(2)': { display: 'inline-block', width: '7rem', marginInline: '0.5rem' },
});

function Drift({ drift, tags }: { readonly drift: DriftStudy; readonly tags: Tags }): ReactElement {
  const rows = merged(drift, tags, BY_STRING);
  return (
    <>
      <DriftChart
        drift={drift}
        title={`${inShort(drift, tags).replace(/^a/, 'A')}: charge of each string, %`}
        lines={merged(drift, tags, TOGETHER)}
      />
      <Sideways label="What each string did">
        <FigureTable>
          <thead>
            <tr>
              <th scope="col" data-text>
                String
              </th>
              <th scope="col">Given</th>
              <th scope="col">Taken</th>
              <th scope="col">Gassed</th>
              <th scope="col">Of the bank</th>
              <th scope="col">Lowest</th>
              <th scope="col">Highest</th>
              <th scope="col">At the end</th>
              <th scope="col">Most at once</th>
            </tr>
          </thead>
          <tbody>
            {rows
              .flatMap(({ at, tag }) => (drift.strings[at] === undefined ? [] : [{ one: drift.strings[at], tag }]))
              .map(({ one, tag }) => (
                <tr key={tag}>
                  <th scope="row" data-text>
                    <KeyOf tags={tags} id={one.id} /> {tag === tagOf(tags, one.id) ? '' : one.half}
                  </th>
                  <Ah value={one.givenAh} />
                  <Ah value={one.takenAh} />
                  <Ah value={one.gassedAh} />
                  <td>{one.share === null ? '–' : percent(one.share)}</td>
                  <td>{percent(one.lowestCharge)}</td>
                  <td>{percent(one.highestCharge)}</td>
                  <td>{percent(one.endCharge)}</td>
                  <td>
                    <Figure value={one.largestA} unit="A" digits={3} prefix={false} />
                  </td>
                </tr>
              ))}
          </tbody>
        </FigureTable>
      </Sideways>
      <Events drift={drift} />
      <Quiet>{booksLine(drift)}</Quiet>
      <Assumed texts={drift.assumed} />
    </>
  );
}

function Ah({ value }: { readonly value: number }): ReactElement {
  return (
    <td>
      <Figure value={value} unit="Ah" digits={3} />
    </td>
  );
}

function Events({ drift: { events } }: { readonly drift: DriftStudy }): ReactElement {
  if (events.length === 0) return <Said>Nothing dropped out, and no string ran empty.</Said>;
  return (
    <ul style={{ margin: '0.25rem 0', paddingInlineStart: '1.25rem', fontSize: '0.875rem' }}>
      {events.slice(0, MOST_EVENTS).map(({ hours, text }) => (
        <li key={`${String(hours)} ${text}`}>
          {formatQuantity({ value: hours, unit: 'h', digits: 3 })}: {text}
        </li>
      ))}
      {events.length > MOST_EVENTS && <li>and {events.length - MOST_EVENTS} more</li>}
    </ul>
  );
}

/** The parts of the throughput that a sum of some thousand steps may miss by rounding. */
const ROUNDING = 1e-9;

/** `The books add up: 812 Ah and 20.1 kWh went through …`, or what is missing in them. */
function booksLine({ books, steps, hours }: DriftStudy): string {
  const { throughputAh, mismatchAh, throughputWh, mismatchWh, lostWh, gassedWh } = books;
  const plain = (value: number, unit: string): string => wholeFigureText({ value, unit, digits: 3 });
  const addsUp =
    Math.abs(mismatchAh) <= ROUNDING * throughputAh && Math.abs(mismatchWh) <= ROUNDING * throughputWh
      ? 'The books add up to a billionth'
      : `The books miss ${plain(mismatchAh, 'Ah')} and ${plain(mismatchWh, 'Wh')}`;
  return (
    `${addsUp}: ${plain(throughputAh, 'Ah')} and ${plain(throughputWh, 'Wh')} went through, ` +
    `${plain(lostWh, 'Wh')} of it to heat and ${plain(gassedWh, 'Wh')} to gas. ` +
    `${String(steps)} steps over ${formatQuantity({ value: hours, unit: 'h', digits: 4 })}.`
  );
}
