/** The invented example jobs: what a new job can start from. */
import canalBoat from './canal-boat.job.json?raw';
import coastVan from './coast-van.job.json?raw';
import estuaryKetch from './estuary-ketch.job.json?raw';
import ridgeCabin from './ridge-cabin.job.json?raw';
import sixVoltHut from './six-volt-hut.job.json?raw';
import seededSloop from './sloop-with-seeded-trouble.job.json?raw';
import twoBankSloop from './two-bank-sloop.job.json?raw';
import valleyWorkshop from './valley-workshop.job.json?raw';
import weekendHut from './weekend-hut.job.json?raw';

export interface Example {
  /** File name without `.job.json`, and the name that the command `new` takes. */
  readonly name: string;
  /** The job's own title. */
  readonly title: string;
  /** What there is to see in it. */
  readonly oneLine: string;
  /** The job file as it stands. */
  readonly text: string;
}

function example(name: string, text: string, oneLine: string): Example {
  const { title } = JSON.parse(text) as { title: string };
  return { name, title, oneLine, text };
}

/** Simplest first. */
export const examples: readonly Example[] = [
  example('weekend-hut', weekendHut, 'the smallest whole job: one block, a fuse on its post, three loads'),
  example('six-volt-hut', sixVoltHut, 'four 6 V flooded blocks two by two, a switching solar controller'),
  example('coast-van', coastVan, 'two lithium blocks, alternator through a DC-DC converter, roof array, 1.5 kW inverter'),
  example('canal-boat', canalBoat, 'a row of four lithium blocks linked in a ladder, alternator and shore charger'),
  example('estuary-ketch', estuaryKetch, '24 V in two blocks, 12 V loads from the middle through an equaliser'),
  example('two-bank-sloop', twoBankSloop, 'engine battery and house bank, combining relay or diode isolator, AWG sizes'),
  example('ridge-cabin', ridgeCabin, 'three 24 V strings of two AGM blocks, one string newer and on longer leads'),
  example('valley-workshop', valleyWorkshop, 'two 48 V lithium strings, 3 kW inverter with its surge, 48 V to 12 V converter'),
  example('sloop-with-seeded-trouble', seededSloop, 'the two-bank sloop with four troubles put in on purpose'),
];
