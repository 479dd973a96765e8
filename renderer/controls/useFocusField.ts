/** Brings the person to a field that another screen has named, once. */
import { type RefObject, useEffect } from 'react';
import { useSession } from '../state/session.ts';

export function useFocusField(key: string | undefined, field: RefObject<HTMLElement | null>): void {
  const wanted = useSession((session) => session.focusField);
  useEffect(() => {
    if (key === undefined || wanted !== key || field.current === null) return;
    for (
      let fold = field.current.closest('details');
      fold !== null;
      fold = fold.parentElement?.closest('details') ?? null
    ) {
      fold.open = true;
    }
    field.current.focus();
    field.current.scrollIntoView({ block: 'center' });
    useSession.setState({ focusField: null });
  }, [key, wanted, field]);
}
