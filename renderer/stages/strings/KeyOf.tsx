/** The tag of a string beside its hatch. */
import type { ReactElement } from 'react';
import { StringKey } from '../../charts/Hatches.tsx';
import type { Tags } from './tags.ts';

export function KeyOf({ tags, id }: { readonly tags: Tags; readonly id: string }): ReactElement {
  const known = tags.get(id);
  return known === undefined ? <strong>{id}</strong> : <StringKey tag={known.tag} hatch={known.hatch} />;
}
