/** Start small: a handful of figures, and the answer of the whole network beside them at once, with all that it took for granted. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { type ReactElement, useMemo, useState } from 'react';
import type { Chemistry, Practice, SmallJob } from '../../core/api.ts';
import { ChoiceField } from '../controls/ChoiceField.tsx';
import { CountField } from '../controls/CountField.tsx';
import { LengthField } from '../controls/LengthField.tsx';
import { QuantityField } from '../controls/QuantityField.tsx';
import { choiceWord } from '../controls/words.ts';
import { startDraft } from '../frame/openings.ts';
import { useRoom } from '../frame/useRoom.ts';
import { usePreferences } from '../state/preferences.ts';
import { useChannel } from '../state/session.ts';
import { answerOf } from './answerOf.ts';
import { SmallAnswerView } from './SmallAnswerView.tsx';

const CHEMISTRIES: readonly Chemistry[] = ['flooded', 'agm', 'gel', 'lfp'];
const PRACTICES: readonly Practice[] = ['iec-land', 'us-land', 'iso-marine', 'us-marine'];
/** Blocks that are sold, by chemistry. Common practice, no source. */
const blockVolts = (chemistry: Chemistry): readonly number[] => (chemistry === 'lfp' ? [12.8, 25.6, 51.2] : [2, 6, 12]);

/** What stands in the form before anything is typed; invented. */
const FIRST: SmallJob = {
  title: 'My system',
  practice: 'iec-land',
  systemV: 12,
  chemistry: 'agm',
  blockNominalV: 12,
  blocksInParallel: 1,
  capacityAh: 100,
  loadW: 60,
  supply: 'dc',
  bankToMainM: 1,
  mainToLoadM: 4,
};

export function StartSmall(): ReactElement {
  const channel = useChannel();
  const isTight = useRoom() === 'tight';
  const units = usePreferences((preferences) => preferences.units);
  const [small, setSmall] = useState<SmallJob>(() => ({ ...FIRST, practice: units === 'us' ? 'us-land' : 'iec-land' }));
  const answer = useMemo(() => answerOf(small), [small]);
  const change = (part: Partial<SmallJob>): null => {
    setSmall((before) => fitting({ ...before, ...part }));
    return null;
  };
  return (
    <Box component="section" aria-labelledby="small-head">
      <Typography variant="h2" id="small-head">
        Start small
      </Typography>
      <Typography variant="body2" sx={{ color: 'var(--soft)', mb: 1 }}>
        Say what you know; the answer beside it is worked out as you type. Lengths are along the cable, one way.
      </Typography>
      <Box
        sx={{
          display: 'grid',
          gridTemplateColumns: isTight ? 'minmax(0, 1fr)' : 'minmax(0, 11fr) minmax(0, 10fr)',
          gap: 3,
        }}
      >
        <Form small={small} change={change} />
        <Box>
          {answer.ok ? (
            <>
              <SmallAnswerView answer={answer.value} />
              <Button
                variant="contained"
                sx={{ mt: 1.5 }}
                onClick={() => void startDraft(channel, answer.value.draft, 'Started small')}
              >
                Open it in Wiring
              </Button>
            </>
          ) : (
            <Typography role="alert" sx={{ color: 'var(--stop)' }}>
              {answer.issues.map(({ message }) => message).join(' ')}
            </Typography>
          )}
        </Box>
      </Box>
    </Box>
  );
}

/** Another chemistry or system volts can make the block one that is not sold or does not add up. */
function fitting(small: SmallJob): SmallJob {
  const sold = blockVolts(small.chemistry);
  const fits = sold.includes(small.blockNominalV) && small.blockNominalV <= small.systemV * 1.1;
  if (fits) return small;
  const most = sold.filter((volts) => volts <= small.systemV * 1.1).at(-1) ?? sold[0] ?? small.blockNominalV;
  return { ...small, blockNominalV: most };
}

interface FormProps {
  readonly small: SmallJob;
  readonly change: (part: Partial<SmallJob>) => null;
}

function Form({ small, change }: FormProps): ReactElement {
  /** An emptied field keeps the figure that stood in it. */
  const figure = (field: keyof SmallJob) => (_store: unknown, value: number | undefined) =>
    value === undefined ? 'A figure is needed here.' : change({ [field]: value });
  return (
    <Box>
      <ChoiceField
        required
        label="Rule book"
        value={small.practice}
        of={PRACTICES}
        words={(choice) => choiceWord('practice', choice)}
        onCommit={(practice) => change({ practice: practice as Practice })}
      />
      <ChoiceField
        required
        label="System volts"
        value={String(small.systemV)}
        of={['12', '24', '48']}
        words={(volts) => `${volts} V`}
        onCommit={(volts) => change({ systemV: Number(volts) as SmallJob['systemV'] })}
      />
      <ChoiceField
        required
        label="Battery"
        value={small.chemistry}
        of={CHEMISTRIES}
        words={(choice) => choiceWord('chemistry', choice)}
        onCommit={(chemistry) => change({ chemistry: chemistry as Chemistry })}
      />
      <ChoiceField
        required
        label="Volts of one block"
        hint="One battery case, as its label says."
        value={String(small.blockNominalV)}
        of={blockVolts(small.chemistry)
          .filter((volts) => volts <= small.systemV * 1.1)
          .map(String)}
        words={(volts) => `${volts} V`}
        onCommit={(volts) => change({ blockNominalV: Number(volts) })}
      />
      <QuantityField
        required
        label="Amp-hours of one block"
        unit="Ah"
        given={small.capacityAh}
        onCommit={figure('capacityAh')}
      />
      <CountField
        required
        label="Strings side by side"
        hint="Rows of blocks that each make the system’s volts."
        value={small.blocksInParallel}
        onCommit={(count) => (count === undefined ? 'A figure is needed here.' : change({ blocksInParallel: count }))}
      />
      <QuantityField required label="One load" unit="W" given={small.loadW} onCommit={figure('loadW')} />
      <ChoiceField
        required
        label="It is fed with"
        value={small.supply}
        of={['dc', 'ac']}
        words={(choice) => (choice === 'dc' ? 'DC, straight from the bank' : 'AC, through an inverter')}
        onCommit={(supply) => change({ supply: supply as SmallJob['supply'] })}
      />
      <LengthField
        required
        label="Bank to main switch"
        way="one-way"
        given={small.bankToMainM}
        onCommit={figure('bankToMainM')}
      />
      <LengthField
        required
        label={small.supply === 'ac' ? 'Main switch to inverter' : 'Main switch to load'}
        way="one-way"
        given={small.mainToLoadM}
        onCommit={figure('mainToLoadM')}
      />
    </Box>
  );
}
