/** Gives an edit to the open job, and says in one sentence why it cannot be taken. */
import { type Edit, plainFields } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';

/** `null` where it was taken, else what to show at the field. */
export type Taken = string | null;

export function takeEdit(edit: Edit): Taken {
  const result = useOpenJob.getState().edit(edit);
  if (result.ok) return null;
  const why = plainFields(result.issues[0]?.message ?? 'That cannot be.');
  return why.charAt(0).toUpperCase() + why.slice(1);
}
