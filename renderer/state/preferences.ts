/** How the person likes it: theme, paper, units, text size, motion. Kept by the host, never part of a job. */
import { create } from 'zustand';
import type { HostChannel, Preferences } from '../../core/host.ts';

export const usePreferences = create<Preferences>()(() => ({
  theme: 'system',
  paper: 'A4',
  units: 'metric',
  textPercent: 100,
  motion: 'system',
}));

export async function readPreferences(channel: HostChannel): Promise<void> {
  const answer = await channel.call('preferences.read', {});
  if (answer.ok) usePreferences.setState(answer.value);
}

/** Shows the change at once; the host keeps it. */
export function changePreferences(channel: HostChannel, change: Partial<Preferences>): void {
  usePreferences.setState(change);
  void channel.call('preferences.change', change);
}
