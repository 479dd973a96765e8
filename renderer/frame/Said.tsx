/** Says to screen readers what was last done. */
import type { ReactElement } from 'react';
import { useOpenJob } from '../state/openJob.ts';

export function Said(): ReactElement {
  const said = useOpenJob((job) => job.said);
  return (
    <div className="only-read" role="status" aria-live="polite">
      {said}
    </div>
  );
}
