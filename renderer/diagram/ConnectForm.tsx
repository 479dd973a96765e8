/** What to put between two junctions: a cable of a size and a length, a device in the line, or nothing but one junction. */
import Button from '@mui/material/Button';
import { type ReactElement, useState } from 'react';
import { type JunctionId, KIND_WORDS, type PartKind, returnOf } from '../../core/api.ts';
import { LengthField } from '../controls/LengthField.tsx';
import { SizeField } from '../controls/SizeField.tsx';
import { useOpenJob } from '../state/openJob.ts';
import { connectPair, connectWith, makeOne } from './edits.ts';
import { useView } from './view.ts';

const DEVICES: readonly PartKind[] = ['fuse', 'breaker', 'switch', 'shunt', 'joint'];

export function ConnectForm({
  from,
  to,
  onDone,
}: {
  readonly from: JunctionId;
  readonly to: JunctionId;
  readonly onDone: () => void;
}): ReactElement {
  const { lastSize, lastLength } = useView();
  const job = useOpenJob((open) => open.job);
  const { practice } = job;
  const back = { from: returnOf(job, from), to: returnOf(job, to) };
  const [size, setSize] = useState<string>(lastSize);
  const [length, setLength] = useState<number | string>(lastLength);
  const taken = (): void => {
    useView.setState({ lastSize: size, lastLength: String(length) });
    onDone();
  };
  const runBoth = (fromMinus: JunctionId, toMinus: JunctionId): void => {
    taken();
    connectPair(
      { plus: from, minus: fromMinus },
      { plus: to, minus: toMinus },
      { kind: 'pair', size, lengthM: length },
    );
  };
  const run = (): void => {
    taken();
    connectWith(from, to, { kind: 'cable', size, lengthM: length });
  };
  return (
    <div style={{ display: 'grid', gap: '0.5rem' }}>
      <SizeField
        label="Size"
        given={size}
        make={{ metal: undefined, stranding: undefined }}
        practice={practice}
        onCommit={(store) => {
          if (store !== undefined) setSize(store);
          return null;
        }}
      />
      <LengthField
        label="Length, one way"
        way="ask"
        given={length}
        onCommit={(store) => {
          if (store !== undefined) setLength(store);
          return null;
        }}
      />
      <Button variant="contained" onClick={run}>
        Run a cable
      </Button>
      {back.from !== undefined && back.to !== undefined && back.from !== back.to && (
        <Button variant="outlined" onClick={() => runBoth(back.from as JunctionId, back.to as JunctionId)}>
          {`Run out and back, ${back.to} to ${back.from} too`}
        </Button>
      )}
      <div style={{ display: 'flex', flexWrap: 'wrap', gap: '0.25rem' }}>
        {DEVICES.map((kind) => (
          <Button
            key={kind}
            variant="outlined"
            onClick={() => {
              onDone();
              connectWith(from, to, { kind });
            }}
          >
            {KIND_WORDS[kind]}
          </Button>
        ))}
      </div>
      <Button
        variant="text"
        onClick={() => {
          onDone();
          makeOne(from, to);
        }}
      >
        Make them one junction, {to}
      </Button>
    </div>
  );
}
