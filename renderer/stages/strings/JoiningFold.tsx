/** May these two be joined now? Two sides, what a meter says of them, and what the first instant would be. */
import Box from '@mui/material/Box';
import { styled } from '@mui/material/styles';
import { type ReactElement, useMemo } from 'react';
import type { CheckedJob, Joining } from '../../../core/api.ts';
import { CautionStrip } from '../../controls/CautionStrip.tsx';
import { ChoiceField } from '../../controls/ChoiceField.tsx';
import { CountField } from '../../controls/CountField.tsx';
import { Quiet } from '../../controls/Prose.tsx';
import { QuantityField } from '../../controls/QuantityField.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { choiceWord } from '../../controls/words.ts';
import type { BankNow, JoiningQuestion } from '../../workers/stringsMessages.ts';
import { Fold } from './Fold.tsx';
import { JoiningAnswer } from './JoiningAnswer.tsx';
import {
  BLOCK,
  firstForm,
  type JoinBy,
  type JoinForm,
  questionOf,
  type SideChoice,
  type SideForm,
  sideChoices,
} from './joinForm.ts';
import { changeStringsView, useStringsView } from './stringsView.ts';
import { useStudy } from './studies.ts';
import type { Tags } from './tags.ts';
import { joiningTitle } from './words.ts';

/** What a hand has to know at this step. */
const CAUTIONS = [
  'Eye protection on; rings and watches off. Make the last connection away from the battery: it sparks, and gas lies at the battery.',
  'Prove it with the meter first, plus to plus and minus to minus: no more between the open ends than the gap below.',
  'Never join strings of another chemistry or another number of cells in series to each other.',
  'If it sparks hard or a lead grows warm, open it again and charge both full apart from each other first.',
];

export interface JoiningFoldProps {
  readonly job: CheckedJob;
  readonly now: BankNow;
  readonly tags: Tags;
}

export function JoiningFold({ job, now, tags }: JoiningFoldProps): ReactElement {
  const view = useStringsView();
  const choices = useMemo(() => sideChoices(now.banks, tags), [now.banks, tags]);
  const form = view.joining ?? firstForm(job, now.atRest, choices);
  const question: JoiningQuestion | null = questionOf(form, choices);
  const study = useStudy('joining', question, question !== null);
  const change = (part: Partial<JoinForm>): void => changeStringsView({ joining: { ...form, ...part } });
  const joining = study.answer === null || 'missing' in study.answer ? null : study.answer;
  return (
    <Fold name="joining" title="Join now?" answer={joining === null ? 'two sides, two readings' : inShort(joining)}>
      <CautionStrip title="Before a hand joins them" texts={CAUTIONS} />
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.5rem 2rem', alignItems: 'start' }}>
        <Box sx={{ flex: '1 1 19rem', maxWidth: '26rem', minWidth: 0 }}>
          <Form form={form} choices={choices} onChange={change} />
        </Box>
        <Box sx={{ flex: '3 1 26rem', minWidth: 0 }}>
          {question === null ? (
            <Quiet>
              {form.by === 'as-drawn'
                ? 'A loose block is in no job: give two readings or two states of charge.'
                : `Enter ${form.by === 'charge' ? 'both states of charge' : 'both readings'}, and the answer stands here.`}
            </Quiet>
          ) : (
            <StudyPlace study={study} doing="Working it out" begin="Work it out">
              {(answer) =>
                'missing' in answer ? (
                  <Quiet>This cannot be answered yet: it needs {answer.missing}.</Quiet>
                ) : (
                  <JoiningAnswer joining={answer} />
                )
              }
            </StudyPlace>
          )}
        </Box>
      </Box>
    </Fold>
  );
}

function inShort(joining: Joining): string {
  return `${joining.a} and ${joining.b}: ${joiningTitle(joining)}`;
}

interface FormProps {
  readonly form: JoinForm;
  readonly choices: readonly SideChoice[];
  readonly onChange: (part: Partial<JoinForm>) => void;
}

const BY: Readonly<Record<JoinBy, string>> = {
  volts: 'two voltmeter readings',
  charge: 'two states of charge',
  'as-drawn': 'the job as it stands',
};

function Form({ form, choices, onChange }: FormProps): ReactElement {
  return (
    <>
      <ChoiceField
        label="Judged by"
        value={form.by}
        required
        of={Object.keys(BY)}
        words={(by) => BY[by as JoinBy]}
        onCommit={(by) => {
          if (by !== undefined) onChange({ by: by as JoinBy });
          return null;
        }}
      />
      <Side
        name="First"
        side={form.a}
        by={form.by}
        choices={choices}
        onChange={(a) => onChange({ a: { ...form.a, ...a } })}
      />
      <Side
        name="Second"
        side={form.b}
        by={form.by}
        choices={choices}
        onChange={(b) => onChange({ b: { ...form.b, ...b } })}
      />
      <QuantityField
        label="Lead between"
        unit="ohm"
        given={form.lead.store}
        assumed="as drawn"
        hint="Both ways together, with its clamps."
        onCommit={(store, value) => {
          onChange({ lead: { store, value } });
          return null;
        }}
      />
      <QuantityField
        label="Limit"
        unit="A"
        given={form.limit.store}
        assumed="the least of all known"
        onCommit={(store, value) => {
          onChange({ limit: { store, value } });
          return null;
        }}
      />
    </>
  );
}

interface SideProps {
  readonly name: string;
  readonly side: SideForm;
  readonly by: JoinBy;
  readonly choices: readonly SideChoice[];
  readonly onChange: (part: Partial<SideForm>) => void;
}

function Side({ name, side, by, choices, onChange }: SideProps): ReactElement {
  const lower = name.toLowerCase();
  return (
    <Group aria-label={`${name} side`}>
      <ChoiceField
        label={`${name} side`}
        value={side.which}
        required
        of={[...choices.map(({ key }) => key), BLOCK]}
        words={(which) => choices.find(({ key }) => key === which)?.words ?? 'a loose block or row'}
        onCommit={(which) => {
          if (which !== undefined) onChange({ which });
          return null;
        }}
      />
      {side.which === BLOCK && <BlockFields name={lower} side={side} onChange={onChange} />}
      {by === 'volts' && (
        <QuantityField
          label={`Volts, ${lower}`}
          unit="V"
          given={side.volts.store}
          assumed="whole side, at rest"
          onCommit={(store, value) => {
            onChange({ volts: { store, value } });
            return null;
          }}
        />
      )}
      {by === 'charge' && (
        <QuantityField
          label={`Charge, ${lower}`}
          unit="1"
          given={side.charge.store}
          assumed="100 % is full"
          onCommit={(store, value) => {
            if (value !== undefined && (value < 0 || value > 1)) return 'Between 0 and 100 %.';
            onChange({ charge: { store, value } });
            return null;
          }}
        />
      )}
    </Group>
  );
}

const CHEMISTRIES = ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'] as const;

function BlockFields({ name, side, onChange }: Pick<SideProps, 'name' | 'side' | 'onChange'>): ReactElement {
  const { block } = side;
  const change = (part: Partial<SideForm['block']>): null => {
    onChange({ block: { ...block, ...part } });
    return null;
  };
  return (
    <>
      <ChoiceField
        label={`Chemistry, ${name}`}
        value={block.chemistry}
        required
        of={CHEMISTRIES}
        words={(chemistry) => choiceWord('chemistry', chemistry)}
        onCommit={(chosen) => {
          const chemistry = CHEMISTRIES.find((one) => one === chosen);
          return chemistry === undefined ? null : change({ chemistry });
        }}
      />
      <CountField
        label={`In series, ${name}`}
        value={block.blocksInSeries}
        required
        onCommit={(count) =>
          count === undefined ? 'How many blocks stand in series?' : change({ blocksInSeries: count })
        }
      />
      <QuantityField
        label={`Block volts, ${name}`}
        unit="V"
        given={block.blockNominalV.store}
        required
        onCommit={(store, value) => change({ blockNominalV: { store, value } })}
      />
      <QuantityField
        label={`Capacity, ${name}`}
        unit="Ah"
        given={block.capacityAh.store}
        required
        onCommit={(store, value) => change({ capacityAh: { store, value } })}
      />
    </>
  );
}

const Group = styled('fieldset')({ border: 0, margin: 0, padding: 0, minWidth: 0 });
