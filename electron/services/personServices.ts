/** What the person keeps beside jobs: own parts, preferences, the log of readings. */
import type { Bench } from './bench.ts';
import { preferencesFrom } from './preferences.ts';
import type { Doing } from './services.ts';

type PersonMethods =
  | 'library.list'
  | 'library.keep'
  | 'library.remove'
  | 'preferences.read'
  | 'preferences.change'
  | 'readings.add'
  | 'readings.list';

export function personServices({ store: { person } }: Bench): { readonly [M in PersonMethods]: Doing<M> } {
  return {
    'library.list': () => person.ownParts(),
    'library.keep': (part) => {
      person.keepPart(part);
      return part;
    },
    'library.remove': ({ id }) => {
      person.removePart(id);
      return null;
    },
    'preferences.read': () => preferencesFrom(person.preferences()),
    'preferences.change': (changes) => {
      person.changePreferences(new Map(Object.entries(changes).filter(([, value]) => value !== undefined)));
      return preferencesFrom(person.preferences());
    },
    'readings.add': ({ job, reading }) => person.addReading(job, reading),
    'readings.list': ({ job }) => person.readings(job),
  };
}
