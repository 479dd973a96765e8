/** A bug of ours in a stage takes down that stage and nothing else: it is told in plain words, and the job is untouched. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { Component, type ReactNode } from 'react';
import { downloadJob } from './saving.ts';

interface Props {
  /** Another name, another try. */
  readonly name: string;
  readonly children: ReactNode;
}

interface State {
  readonly failed: string | null;
  readonly name: string;
}

export class DefectBoundary extends Component<Props, State> {
  override state: State = { failed: null, name: this.props.name };

  static getDerivedStateFromError(error: unknown): Partial<State> {
    return { failed: error instanceof Error ? error.message : String(error) };
  }

  static getDerivedStateFromProps(props: Props, state: State): Partial<State> | null {
    return props.name === state.name ? null : { failed: null, name: props.name };
  }

  override render(): ReactNode {
    const { failed } = this.state;
    if (failed === null) return this.props.children;
    return (
      <Box role="alert" sx={{ p: 3, maxWidth: '44rem' }}>
        <Typography variant="h1">This part of the screen has failed</Typography>
        <Typography sx={{ my: 1 }}>
          That is a bug of the program, not of your job: every change marked as kept is on the disk. The other stages
          still work.
        </Typography>
        <Typography variant="body2" sx={{ color: 'var(--soft)', overflowWrap: 'anywhere' }}>
          {failed}
        </Typography>
        <Box sx={{ display: 'flex', gap: 1, mt: 2 }}>
          <Button variant="contained" onClick={() => this.setState({ failed: null })}>
            Show it again
          </Button>
          <Button variant="outlined" onClick={downloadJob}>
            Download the job file
          </Button>
        </Box>
      </Box>
    );
  }
}
