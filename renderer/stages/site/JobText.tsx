/** A text at the head of the job. */
import type { ReactElement } from 'react';
import { setTop } from '../../../core/api.ts';
import { TextField } from '../../controls/TextField.tsx';
import { takeEdit } from '../../controls/taken.ts';
import { useOpenJob } from '../../state/openJob.ts';

export interface JobTextProps {
  readonly path: 'title' | 'notes' | 'preparedFor' | 'preparedBy' | 'practiceEdition';
  readonly label: string;
  readonly help?: string;
  readonly rows?: number;
}

export function JobText({ path, label, help, rows }: JobTextProps): ReactElement {
  const kept = useOpenJob(({ job }) => job[path]);
  return (
    <TextField
      label={label}
      value={kept}
      required={path === 'title'}
      focusKey={path}
      below={help}
      {...(rows === undefined ? {} : { rows })}
      onCommit={(value) => takeEdit(setTop({ path, value }))}
    />
  );
}
