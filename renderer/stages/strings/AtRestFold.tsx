/** What flows between the strings with nothing switched on: who feeds whom, and what it comes to. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { type AtRest, formatQuantity } from '../../../core/api.ts';
import { Figure } from '../../controls/Figure.tsx';
import { Quiet } from '../../controls/Prose.tsx';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import { type Tags, tagOf } from './tags.ts';
import { amps, NOTICED_A } from './words.ts';

/** Pairs that are listed; a large bank has hundreds, most of them next to nothing. */
const MOST_PAIRS = 12;

export function AtRestFold({ atRest, tags }: { readonly atRest: AtRest; readonly tags: Tags }): ReactElement {
  const told = atRest.pairs.filter(({ currentA }) => currentA >= NOTICED_A).toSorted((a, b) => b.currentA - a.currentA);
  return (
    <Fold name="rest" title="At rest" answer={atRestInShort(atRest, tags)}>
      {atRest.outcome === 'solved' && told.length > 0 ? (
        <>
          <Feeds>
            {told.slice(0, MOST_PAIRS).map(({ from, to, currentA }) => (
              <li key={`${from} ${to}`}>
                <KeyOf tags={tags} id={from} />
                <Arrow />
                <KeyOf tags={tags} id={to} />
                <Figure value={currentA} unit="A" digits={2} />
              </li>
            ))}
          </Feeds>
          {told.length > MOST_PAIRS && <Quiet>and {told.length - MOST_PAIRS} more pairs with less.</Quiet>}
          <Quiet>
            Each pair is what the difference between the two drives, the others looked through; the pairs of a string
            add up to its current
            {atRest.remainderA >= NOTICED_A ? ` but for ${amps(atRest.remainderA)} that flows elsewhere` : ''}. As long
            as it lasts it turns <Figure value={atRest.lostW} unit="W" digits={2} /> to heat and would move{' '}
            <Figure value={atRest.givenAhPerDay} unit="Ah" digits={2} /> a day; it fades as the strings draw level.
          </Quiet>
        </>
      ) : (
        <Quiet>{atRestInShort(atRest, tags)}.</Quiet>
      )}
    </Fold>
  );
}

function atRestInShort({ outcome, pairs, givenA, lostW }: AtRest, tags: Tags): string {
  if (outcome !== 'solved') return 'The network at rest has no answer';
  const [most] = pairs.toSorted((a, b) => b.currentA - a.currentA);
  if (most === undefined || givenA < NOTICED_A) return 'Nothing to speak of flows with everything off';
  const watts = formatQuantity({ value: lostW, unit: 'W', digits: 2 });
  const pair = `${tagOf(tags, most.from)} feeds ${tagOf(tags, most.to)} ${amps(most.currentA)}`;
  return pairs.length === 1
    ? `${pair} with everything off, ${watts} lost`
    : `${amps(givenA)} flows with everything off, ${watts} lost; most: ${pair}`;
}

function Arrow(): ReactElement {
  return (
    <>
      <svg viewBox="0 0 28 12" aria-hidden style={{ width: '1.75em', height: '0.75em', flex: 'none' }}>
        <path d="M1 6H25M20 1.5L26 6L20 10.5" fill="none" stroke="var(--copper)" strokeWidth="2" />
      </svg>
      <span className="only-read">feeds</span>
    </>
  );
}

const Feeds = styled('ul')({
  display: 'flex',
  flexWrap: 'wrap',
  gap: '0.25rem 2rem',
  listStyle: 'none',
  margin: 0,
  padding: 0,
  '& li': { display: 'inline-flex', alignItems: 'center', gap: '0.5rem', minHeight: '1.5rem' },
});
