import { cableList } from './cableList.ts';
import { fuseList } from './fuseList.ts';
import type { List, ListInput } from './list.ts';
import { partsList } from './partsList.ts';

/** `cables`: what to cut; `fuses`: fuses and breakers; `parts`: every part. */
export type ListName = 'cables' | 'fuses' | 'parts';

/** A list of a job, in the order of the job. */
export function buildList({ list, ...input }: ListInput & { readonly list: ListName }): List {
  switch (list) {
    case 'cables':
      return cableList(input);
    case 'fuses':
      return fuseList(input);
    case 'parts':
      return partsList(input);
  }
}
