import { beforeAll } from 'vitest';
import { buildLocal, startBuiltLocal, testFolder } from './builtLocal.ts';
import { hostContract } from './hostContract.ts';

beforeAll(buildLocal);

hostContract('the local browser host', {
  kind: 'browser',
  pages: 2,
  start: async () => {
    const { folder, remove } = testFolder();
    const host = await startBuiltLocal(folder);
    const [channel, other] = [host.page('first'), host.page('second')];
    return {
      channel,
      other,
      stop: async () => {
        channel.close();
        other.close();
        host.process.kill('SIGTERM');
        await host.ended;
        remove();
      },
    };
  },
});
