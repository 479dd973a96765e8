/** Holds the page when it is closed while a change is still on its way to the disk. */
import { useEffect } from 'react';
import { hasUnkept } from '../state/openJob.ts';

export function useUnkept(): void {
  useEffect(() => {
    window.addEventListener('beforeunload', holdUnkept);
    return () => window.removeEventListener('beforeunload', holdUnkept);
  }, []);
}

function holdUnkept(event: BeforeUnloadEvent): void {
  if (hasUnkept()) event.preventDefault();
}
