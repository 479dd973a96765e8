import { expect, test } from 'vitest';
import { sunAnswer } from '../../renderer/charts/SunChart.tsx';

const year = [1.7, 2.6, 3.7, 4.6, 5.5, 6.1, 6.1, 5.3, 4.1, 2.7, 1.7, 1.34];

test('the title of the sun chart names the month with least sun', () => {
  expect(sunAnswer(year)).toBe('Least sun in December: 1.34 kWh/m² a day');
});

test('a month without a figure is not taken as nought', () => {
  expect(sunAnswer(year.with(11, 1.8))).toMatch(/January/);
  expect(sunAnswer([...year.slice(0, 11), null])).toBe('Least sun in January: 1.7 kWh/m² a day (of 11 months given)');
  expect(sunAnswer(Array.from({ length: 12 }, () => null))).toBe('No month has a figure yet');
});
