/** An invented job of as many parts as asked for: one bank, and branches of breaker, run and load. */
export function largeJob(partCount: number): object {
  const branches = Math.floor((partCount - 3) / 3);
  const branch = (number: number) => [
    { id: `Q${number}`, kind: 'breaker', from: 'POS', to: `P${number}`, ratingA: 16 },
    {
      id: `W${number}`,
      kind: 'pair',
      from: { plus: `P${number}`, minus: 'NEG' },
      to: { plus: `L${number}+`, minus: `L${number}-` },
      lengthM: 2 + (number % 9),
      size: '4 mm2',
    },
    {
      id: `L${number}`,
      kind: 'load',
      label: `Load number ${number}`,
      plus: `L${number}+`,
      minus: `L${number}-`,
      powerW: 10 + number,
    },
  ];
  return {
    format: 'ohmwright-job',
    version: 1,
    title: 'A large boat, invented',
    practice: 'iso-marine',
    parts: [
      {
        id: 'B1',
        kind: 'string',
        plus: 'B+',
        minus: 'NEG',
        chemistry: 'lfp',
        blocksInSeries: 2,
        blockNominalV: 12,
        capacityAh: 600,
      },
      { id: 'M1', kind: 'cable', from: 'B+', to: 'F', lengthM: 1, size: '95 mm2' },
      { id: 'F1', kind: 'fuse', from: 'F', to: 'POS', ratingA: 300 },
      ...Array.from({ length: branches }, (_, index) => branch(index + 1)).flat(),
    ],
  };
}
