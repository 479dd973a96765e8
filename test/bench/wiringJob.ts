/** A job of about so many parts that looks like a real system: strings on bars, sub-panels, fused pairs to loads, a few rings. */

type RawPart = Record<string, unknown> & { id: string };

export function wiringJob(parts: number, strings = Math.max(2, Math.round(parts / 60))): object {
  const list: RawPart[] = [];
  const add = (part: RawPart) => list.push(part);
  for (let k = 0; k < strings; k++) addString(add, k);
  add({ id: 'CHG', kind: 'charger', plus: 'bus+', minus: 'bus-', outputA: 40, setpointV: 28.4 });
  add({ id: 'INV', kind: 'inverter', plus: 'inv+', minus: 'bus-', ratedW: 2000, acPowerW: 900, cutoffV: 21 });
  add({ id: 'FINV', kind: 'fuse', from: 'bus+', to: 'inv+', ratingA: 150, ratingV: 58, interruptA: 20_000 });
  for (let panel = 0; list.length < parts; panel++) addPanel(add, panel, parts - list.length);
  return {
    format: 'ohmwright-job',
    version: 1,
    title: `Wiring of ${parts} parts (invented)`,
    practice: 'iec-land',
    site: { ambientDesignDegC: 20 },
    parts: list,
    cases: [
      { id: 'evening', set: { CHG: { on: false } } },
      { id: 'charging', set: { INV: { on: false } } },
      { id: 'cold', ambientDegC: -5, stateOfCharge: 0.6, set: { CHG: { on: false } } },
      { id: 'quiet', set: { INV: { acPowerW: 0 } } },
    ],
  };
}

function addString(add: (part: RawPart) => void, k: number): void {
  add({
    id: `S${k}`,
    kind: 'string',
    plus: `s${k}+`,
    minus: `s${k}-`,
    chemistry: 'agm',
    blocksInSeries: 2,
    blockNominalV: 12,
    capacityAh: 150,
    stateOfCharge: 0.9 - 0.01 * (k % 5),
  });
  add({ id: `FS${k}`, kind: 'fuse', from: `s${k}+`, to: `f${k}+`, ratingA: 125, ratingV: 58, resistanceOhm: 0.0004 });
  add({
    id: `P${k}`,
    kind: 'pair',
    from: { plus: `f${k}+`, minus: `s${k}-` },
    to: { plus: 'bus+', minus: 'bus-' },
    lengthM: 1 + 0.2 * (k % 4),
    size: '50 mm2',
    endOhm: 0.0002,
  });
}

/** A feeder to a sub-panel, breakers and pairs to its loads; every third panel is also reached by a second way (a ring). */
function addPanel(add: (part: RawPart) => void, panel: number, room: number): void {
  const name = (text: string) => `${text}${panel}`;
  const here = { plus: name('panel+'), minus: name('panel-') };
  add({ id: name('FP'), kind: 'fuse', from: 'bus+', to: name('fp+'), ratingA: 40, ratingV: 58 });
  add({ id: name('JP'), kind: 'joint', from: name('fp+'), to: name('jp+'), resistanceOhm: 0.0002 });
  add({
    id: name('PP'),
    kind: 'pair',
    from: { plus: name('jp+'), minus: 'bus-' },
    to: here,
    lengthM: 4,
    size: '10 mm2',
  });
  if (panel % 3 === 2) {
    const next = { plus: `panel+${panel - 1}`, minus: `panel-${panel - 1}` };
    add({ id: name('RING'), kind: 'pair', from: next, to: here, lengthM: 3, size: '6 mm2' });
  }
  for (let k = 0; k < Math.min(6, Math.ceil(room / 3)); k++) {
    const at = `${panel}.${k}`;
    add({
      id: `B${at}`,
      kind: 'breaker',
      from: here.plus,
      to: `b${at}+`,
      ratingA: 10,
      ratingV: 58,
      resistanceOhm: 0.004,
    });
    add({
      id: `W${at}`,
      kind: 'pair',
      from: { plus: `b${at}+`, minus: here.minus },
      to: { plus: `l${at}+`, minus: `l${at}-` },
      lengthM: 2 + k,
      size: '2.5 mm2',
    });
    const load = [{ powerW: 12 }, { currentA: 0.4 }, { resistanceOhm: 60 }][k % 3]!;
    add({ id: `L${at}`, kind: 'load', plus: `l${at}+`, minus: `l${at}-`, ...load, minimumV: 20 });
  }
}
