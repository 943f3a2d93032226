import { solveLinear } from '../../tone/solve-linear.js';
import type { ComplexSpectrum } from '../shared/fit-line.js';
import type { WindowTransform } from '../shared/window-transform.js';

/** Lobes nearer than this are solved for together, half-widths. */
const TOGETHER = 2;

/**
 * Takes the powers of many lines out of one frame's transform: lines whose lobes overlap are solved for together by least
 * squares, so that each is read free of its neighbours.
 *
 * @param bins - places, ascending
 * @returns complex amplitudes (peak values), index by index
 */
export function fitComb(
  spectrum: ComplexSpectrum,
  transform: WindowTransform,
  bins: readonly number[],
): { readonly re: Float64Array; readonly im: Float64Array } {
  const re = new Float64Array(bins.length);
  const im = new Float64Array(bins.length);
  for (const group of groupLines(bins, TOGETHER * transform.halfWidthBins)) {
    const places = group.map((index) => bins[index]);
    const { matrix, rightRe, rightIm } = normalEquations(spectrum, transform, places);
    const solvedRe = solve(matrix, rightRe);
    const solvedIm = solve(matrix, rightIm);
    group.forEach((index, k) => {
      // X = (A / 2i) e^(iφ) W: the factor 2 and a quarter turn.
      re[index] = -2 * solvedIm[k];
      im[index] = 2 * solvedRe[k];
    });
  }
  return { re, im };
}

/** Indices of lines in runs whose neighbours lie within a distance. */
function groupLines(bins: readonly number[], reach: number): number[][] {
  const groups: number[][] = [];
  bins.forEach((bin, index) => {
    const last = groups.at(-1);
    if (last !== undefined && bin - bins[index - 1] < reach) last.push(index);
    else groups.push([index]);
  });
  return groups;
}

function normalEquations(spectrum: ComplexSpectrum, transform: WindowTransform, places: readonly number[]) {
  const half = transform.halfWidthBins;
  const n = places.length;
  const matrix = Array.from({ length: n }, () => new Float64Array(n));
  const rightRe = new Float64Array(n);
  const rightIm = new Float64Array(n);
  const from = Math.max(1, Math.ceil(places[0] - half));
  const to = Math.min(spectrum.re.length - 2, Math.floor(places[n - 1] + half));
  const lobes = new Float64Array(n);
  for (let k = from; k <= to; k++) {
    let isInside = false;
    for (let i = 0; i < n; i++) {
      const distance = k - places[i];
      // Counting time from the frame's middle turns bin k by kπ.
      lobes[i] = Math.abs(distance) <= half ? transform.at(distance) * (k % 2 === 0 ? 1 : -1) : 0;
      isInside ||= lobes[i] !== 0;
    }
    if (!isInside) continue;
    for (let i = 0; i < n; i++) {
      if (lobes[i] === 0) continue;
      rightRe[i] += lobes[i] * spectrum.re[k];
      rightIm[i] += lobes[i] * spectrum.im[k];
      for (let j = 0; j < n; j++) matrix[i][j] += lobes[i] * lobes[j];
    }
  }
  return { matrix, rightRe, rightIm };
}

/** A line that nothing tells from its neighbour gets 0. */
function solve(matrix: readonly Float64Array[], right: Float64Array): number[] {
  const rows = matrix.map((row, index) => [...row, right[index]]);
  return solveLinear(rows) ?? new Array<number>(right.length).fill(0);
}
