/** A figure of the site, or a threshold of the job, under its path in the job file. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { type Draft, setTop } from '../../../core/api.ts';
import { ChoiceField } from '../../controls/ChoiceField.tsx';
import { CountField } from '../../controls/CountField.tsx';
import { FlagField } from '../../controls/FlagField.tsx';
import { QuantityField } from '../../controls/QuantityField.tsx';
import { takeEdit } from '../../controls/taken.ts';
import { choiceWord } from '../../controls/words.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { jobFigure } from './jobFigures.ts';
import { practiceWords } from './practiceWords.ts';

export interface JobFieldProps {
  readonly path: string;
  /** Stands in grey while the field is empty. */
  readonly assumed?: string;
  /** What is said under it, instead of what the figure is for. */
  readonly below?: string;
}

export function JobField({ path, assumed, below }: JobFieldProps): ReactElement | null {
  const given = useOpenJob(({ draft }) => givenAt(draft, path));
  const commit = (value: unknown) => takeEdit(setTop({ path, value }));
  if (path === 'practice') return <Practices given={given} onCommit={commit} />;
  const figure = jobFigure(path);
  if (figure === undefined) return <GoToField path={path} />;
  const common = {
    label: figure.label,
    focusKey: path,
    below: below ?? figure.use,
    ...(assumed === undefined ? {} : { assumed }),
  };
  return (
    <Box sx={{ containerType: 'inline-size' }}>
      {figure.unit === 'flag' ? (
        <FlagField {...common} value={typeof given === 'boolean' ? given : undefined} onCommit={commit} />
      ) : figure.unit === 'count' ? (
        <CountField {...common} value={typeof given === 'number' ? given : undefined} onCommit={commit} />
      ) : (
        <QuantityField
          {...common}
          unit={figure.unit}
          given={typeof given === 'boolean' ? undefined : given}
          onCommit={commit}
        />
      )}
    </Box>
  );
}

type Given = number | string | boolean | undefined;

function Practices({
  given,
  onCommit,
}: {
  readonly given: Given;
  readonly onCommit: (value: unknown) => string | null;
}): ReactElement {
  return (
    <ChoiceField
      label="Rule book"
      value={typeof given === 'string' ? given : undefined}
      of={practiceWords.map(({ practice }) => practice)}
      words={(choice) => choiceWord('practice', choice)}
      onCommit={onCommit}
    />
  );
}

/** A field of the job that stands on the stage Site only. */
function GoToField({ path }: { readonly path: string }): ReactElement {
  const goStage = useSession((session) => session.goStage);
  return (
    <button type="button" onClick={() => goStage('site', path)}>
      Go to it on the stage Site
    </button>
  );
}

/** What the job file holds there: a number, or the text that was typed. */
function givenAt(draft: Draft, path: string): Given {
  const [group = '', field] = path.split('.');
  const holder = draft[group];
  const value: unknown = field === undefined ? holder : isHolder(holder) ? holder[field] : undefined;
  return typeof value === 'number' || typeof value === 'string' || typeof value === 'boolean' ? value : undefined;
}

function isHolder(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null;
}
