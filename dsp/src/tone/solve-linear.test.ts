import { expect, it } from 'vitest';
import { solveLinear } from './solve-linear.js';

it('solves a system that needs its rows exchanged', () => {
  // x + 2y = 5, 3y + z = 7, 2x = 2: by hand.
  const solution = solveLinear([
    [0, 3, 1, 7],
    [1, 2, 0, 5],
    [2, 0, 0, 2],
  ]);
  // A few units in the last place of numbers near 1.
  [1, 2, 1].forEach((value, index) => expect(solution![index]).toBeCloseTo(value, 14));
});

it('gives null when the equations depend on each other or aren’t numbers', () => {
  expect(
    solveLinear([
      [1, 2, 3],
      [2, 4, 6],
    ]),
  ).toBeNull();
  expect(solveLinear([[Number.NaN, 1]])).toBeNull();
});
