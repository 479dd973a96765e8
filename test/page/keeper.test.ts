import { describe, expect, test, vi } from 'vitest';
import type { Draft } from '../../core/api.ts';
import type { HostAnswer, HostChannel, HostMethod } from '../../core/host.ts';
import { Keeper, type KeepStatus } from '../../renderer/state/keeper.ts';

interface Call {
  readonly method: HostMethod;
  readonly ask: Readonly<Record<string, unknown>>;
}

/** A host that answers as it is told to; it stands for the real one only in what it refuses. */
function host(answers: (call: Call, count: number) => HostAnswer<unknown>) {
  const calls: Call[] = [];
  const channel: HostChannel = {
    call: async (method, ask) => {
      const call = { method, ask: ask as Call['ask'] };
      calls.push(call);
      return answers(call, calls.length) as never;
    },
    listen: () => () => undefined,
  };
  return { channel, calls };
}

const kept = (head: number): HostAnswer<unknown> => ({ ok: true, value: { head, at: '' } });
const draft = (title: string) => ({ format: 'ohmwright-job', version: 1, title, parts: [] }) as Draft;

function keeperOn(channel: HostChannel) {
  const statuses: KeepStatus[] = [];
  const revisions = new Map<number, number>();
  const keeper = new Keeper(channel, 'job', 1, {
    onStatus: (status) => statuses.push(status),
    onKept: (key, revision) => revisions.set(key, revision),
  });
  return { keeper, statuses, revisions };
}

describe('the keeper', () => {
  test('sends changes one at a time, each after the one that was kept before', async () => {
    const { channel, calls } = host((_call, count) => kept(count + 1));
    const { keeper, statuses, revisions } = keeperOn(channel);
    for (const key of [1, 2, 3]) keeper.keep({ key, label: `change ${String(key)}`, draft: draft(`t${String(key)}`) });
    await vi.waitFor(() => expect(statuses.at(-1)).toEqual({ status: 'kept' }));
    expect(calls.map(({ ask }) => ask['after'])).toEqual([1, 2, 3]);
    expect([...revisions]).toEqual([
      [1, 2],
      [2, 3],
      [3, 4],
    ]);
  });

  test('an undo before its change was kept goes to the revision that the change before got', async () => {
    const { channel, calls } = host(({ method, ask }, count) =>
      method === 'jobs.keep' ? kept(count + 1) : { ok: true, value: { head: ask['to'] } },
    );
    const { keeper, statuses } = keeperOn(channel);
    keeper.keep({ key: 1, label: 'one', draft: draft('one') });
    keeper.keep({ key: 2, label: 'two', draft: draft('two') });
    keeper.go(1);
    keeper.keep({ key: 3, label: 'three', draft: draft('three') });
    await vi.waitFor(() => expect(statuses.at(-1)).toEqual({ status: 'kept' }));
    expect(calls.map(({ method }) => method)).toEqual(['jobs.keep', 'jobs.keep', 'jobs.go', 'jobs.keep']);
    expect(calls[2]?.ask).toMatchObject({ from: 3, to: 2 });
    expect(calls[3]?.ask).toMatchObject({ after: 2 });
  });

  test('what could not be kept stays in the queue, is told, and is tried again', async () => {
    let disk = 'full';
    const { channel, calls } = host((_call, count) =>
      disk === 'full' ? { ok: false, trouble: { code: 'disk-full', message: 'The disk is full.' } } : kept(count),
    );
    const { keeper, statuses } = keeperOn(channel);
    keeper.keep({ key: 1, label: 'one', draft: draft('one') });
    await vi.waitFor(() => expect(statuses.at(-1)?.status).toBe('trouble'));
    expect(keeper.pending).toBe(1);
    disk = 'free';
    keeper.tryAgain();
    await vi.waitFor(() => expect(statuses.at(-1)).toEqual({ status: 'kept' }));
    expect(keeper.pending).toBe(0);
    expect(calls.length).toBeGreaterThanOrEqual(2);
  });

  test('after a conflict nothing is sent until the person has said how to go on', async () => {
    const { channel, calls } = host(({ ask }) =>
      ask['after'] === 1
        ? { ok: false, trouble: { code: 'conflict', message: 'Changed elsewhere.', head: 9 } }
        : kept(10),
    );
    const { keeper, statuses } = keeperOn(channel);
    keeper.keep({ key: 1, label: 'one', draft: draft('one') });
    await vi.waitFor(() => expect(statuses.at(-1)?.status).toBe('trouble'));
    await new Promise((resolve) => setTimeout(resolve, 50));
    expect(calls).toHaveLength(1);
    await keeper.continueFrom(9);
    await vi.waitFor(() => expect(statuses.at(-1)).toEqual({ status: 'kept' }));
    expect(calls[1]?.ask).toMatchObject({ after: 9 });
  });
});
