/** Keys that work wherever the person is. In a field for text, undo and redo belong to the field. */
import { useEffect } from 'react';
import { useOpenJob } from '../state/openJob.ts';
import { useSession } from '../state/session.ts';
import { useFind } from './find.ts';
import { saveJob } from './saving.ts';

export function useKeys(): void {
  useEffect(() => {
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, []);
}

function onKey(event: KeyboardEvent): void {
  if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
  const { key: job, undo, redo } = useOpenJob.getState();
  if (job === null) return;
  const act = actionFor(event, undo, redo);
  if (act === null) return;
  event.preventDefault();
  void act();
}

function actionFor(
  event: KeyboardEvent,
  undo: () => Promise<void>,
  redo: () => Promise<void>,
): (() => Promise<void> | void) | null {
  switch (event.key.toLowerCase()) {
    case 'k':
      return () => useFind.setState({ open: true });
    case 's':
      return () => {
        const { channel } = useSession.getState();
        return channel === null ? undefined : saveJob(channel, event.shiftKey ? 'ask' : 'known');
      };
    case 'z':
      if (isTextField(event.target)) return null;
      return event.shiftKey ? redo : undo;
    case 'y':
      return isTextField(event.target) ? null : redo;
    default:
      return null;
  }
}

function isTextField(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable || target instanceof HTMLTextAreaElement) return true;
  return target instanceof HTMLInputElement && !['checkbox', 'radio', 'button', 'range'].includes(target.type);
}
