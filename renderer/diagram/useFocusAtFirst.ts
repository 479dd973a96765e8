/** Puts the keyboard into a field when what it stands in has been opened. */
import { type RefObject, useEffect, useRef } from 'react';

export function useFocusAtFirst<T extends HTMLElement>(isWanted = true): RefObject<T | null> {
  const ref = useRef<T>(null);
  useEffect(() => {
    if (isWanted) ref.current?.focus();
  }, [isWanted]);
  return ref;
}
