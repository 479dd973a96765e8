/** A button that asks once more, in its own place, before it does what it says. */
import { type ReactElement, type ReactNode, useEffect, useRef, useState } from 'react';
import { Group, SmallButton } from './AskRow.tsx';

export interface ConfirmButtonProps {
  readonly children: ReactNode;
  /** The question: `Delete F3?` */
  readonly ask: string;
  /** What the button of the answer says. */
  readonly yes?: string;
  readonly onConfirm: () => void;
}

export function ConfirmButton({ children, ask, yes = 'Yes', onConfirm }: ConfirmButtonProps): ReactElement {
  const [asking, setAsking] = useState(false);
  const keep = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (asking) keep.current?.focus();
  }, [asking]);
  if (!asking) {
    return (
      <SmallButton type="button" onClick={() => setAsking(true)}>
        {children}
      </SmallButton>
    );
  }
  return (
    <Group
      aria-label={ask}
      style={{ display: 'flex', flexWrap: 'wrap', alignItems: 'center', gap: '0.25rem' }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.stopPropagation();
        setAsking(false);
      }}
    >
      <span style={{ fontSize: '0.875rem' }}>{ask}</span>
      <SmallButton
        type="button"
        onClick={() => {
          setAsking(false);
          onConfirm();
        }}
      >
        {yes}
      </SmallButton>
      <SmallButton type="button" ref={keep} onClick={() => setAsking(false)}>
        No
      </SmallButton>
    </Group>
  );
}
