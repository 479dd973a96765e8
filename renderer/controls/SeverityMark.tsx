/** How grave a finding is: a shape first, then a word, then a tone. */
import type { ReactElement } from 'react';
import type { Severity } from '../../core/api.ts';

const SHAPES: Readonly<Record<Severity, ReactElement>> = {
  // An octagon with a bar across.
  stop: (
    <>
      <path d="M5.3 1h5.4L15 5.3v5.4L10.7 15H5.3L1 10.7V5.3Z" fill="currentColor" />
      <path d="M4.5 8h7" stroke="var(--sheet)" strokeWidth="2" />
    </>
  ),
  // A triangle on its base.
  fix: (
    <>
      <path d="M8 1.5L15.2 14.5H0.8Z" fill="currentColor" />
      <path d="M8 6v4.2M8 11.8v1.2" stroke="var(--sheet)" strokeWidth="1.6" />
    </>
  ),
  // The outline of an eye.
  look: (
    <>
      <path d="M0.8 8C4 2.8 12 2.8 15.2 8C12 13.2 4 13.2 0.8 8Z" fill="none" stroke="currentColor" strokeWidth="1.6" />
      <circle cx="8" cy="8" r="2.2" fill="currentColor" />
    </>
  ),
  // A dot.
  note: <circle cx="8" cy="8" r="3.2" fill="currentColor" />,
};

const WORDS: Readonly<Record<Severity, string>> = { stop: 'Stop', fix: 'Fix', look: 'Look', note: 'Note' };

export interface SeverityMarkProps {
  readonly severity: Severity;
  /** How many; stands before the word. */
  readonly count?: number;
  /** The shape alone, where the word stands beside it already. */
  readonly bare?: boolean;
}

export function SeverityMark({ severity, count, bare = false }: SeverityMarkProps): ReactElement {
  const words = count === undefined ? WORDS[severity] : `${String(count)} ${WORDS[severity].toLowerCase()}`;
  return <MarkLine tone={`var(--${severity})`} shape={SHAPES[severity]} words={words} bare={bare} />;
}

/** A check that could not be made: an empty box, dashed. */
export function NotDoneMark({ count }: { readonly count?: number }): ReactElement {
  return (
    <MarkLine
      tone="var(--soft)"
      shape={<path d="M2.5 2.5h11v11h-11Z" fill="none" stroke="currentColor" strokeWidth="1.6" strokeDasharray="3 2" />}
      words={count === undefined ? 'Not done' : `${String(count)} not done`}
    />
  );
}

function MarkLine({
  tone,
  shape,
  words,
  bare = false,
}: {
  readonly tone: string;
  readonly shape: ReactElement;
  readonly words: string;
  readonly bare?: boolean;
}): ReactElement {
  return (
    <span
      style={{
        display: 'inline-flex',
        alignItems: 'center',
        gap: '0.35rem',
        color: tone,
        fontWeight: 600,
        whiteSpace: 'nowrap',
      }}
    >
      <svg aria-hidden viewBox="0 0 16 16" style={{ width: '1em', height: '1em', flex: 'none' }}>
        {shape}
      </svg>
      {!bare && <span>{words}</span>}
    </span>
  );
}
