import { createStockhamPlan, runPasses } from './stockham.js';

/** Columns or rows taken at a time: eight doubles fill a cache line. */
const BATCH = 8;

/** Transforms the complex sequence that real samples make in pairs (even ones real, odd ones imaginary). */
export interface PackedTransform {
  /** @param samples - 2·length values, not modified; re, im - `length` values at least, written */
  (samples: Float64Array, re: Float64Array, im: Float64Array): void;
}

/**
 * Makes a transform for lengths that outgrow the cache: length = rows × columns, short transforms down the columns,
 * a twiddle for each element, short transforms along the rows. Each short one runs within the cache.
 *
 * @param length - complex points, a power of two, 4096 or more
 * @see D. H. Bailey, "FFTs in external or hierarchical memory", J. Supercomputing 4, 1990: the four-step form
 */
export function createSplitTransform(length: number): PackedTransform {
  const log2 = Math.round(Math.log2(length));
  const rows = 2 ** (log2 >> 1);
  const columns = length / rows;
  const columnPlan = createStockhamPlan(rows);
  const rowPlan = createStockhamPlan(columns);
  const longest = Math.max(rows, columns) * BATCH;
  const ar = new Float64Array(longest);
  const ai = new Float64Array(longest);
  const br = new Float64Array(longest);
  const bi = new Float64Array(longest);
  const middleRe = new Float64Array(length);
  const middleIm = new Float64Array(length);
  // W^j as a coarse and a fine factor: two tables of about √length instead of one of length.
  const fineBits = log2 >> 1;
  const fineMask = 2 ** fineBits - 1;
  const fineCos = new Float64Array(fineMask + 1);
  const fineSin = new Float64Array(fineMask + 1);
  const coarseCos = new Float64Array(length / (fineMask + 1));
  const coarseSin = new Float64Array(length / (fineMask + 1));
  for (let j = 0; j <= fineMask; j++) {
    fineCos[j] = Math.cos((2 * Math.PI * j) / length);
    fineSin[j] = Math.sin((2 * Math.PI * j) / length);
  }
  for (let j = 0; j < coarseCos.length; j++) {
    coarseCos[j] = Math.cos((2 * Math.PI * j) / coarseCos.length);
    coarseSin[j] = Math.sin((2 * Math.PI * j) / coarseCos.length);
  }
  const columnRe = columnPlan.passCount % 2 === 0 ? ar : br;
  const columnIm = columnPlan.passCount % 2 === 0 ? ai : bi;
  const rowRe = rowPlan.passCount % 2 === 0 ? ar : br;
  const rowIm = rowPlan.passCount % 2 === 0 ? ai : bi;

  const transformColumns = (samples: Float64Array): void => {
    for (let column = 0; column < columns; column += BATCH) {
      for (let row = 0, to = 0; row < rows; row++, to += BATCH) {
        const from = 2 * (row * columns + column);
        for (let b = 0; b < BATCH; b++) {
          ar[to + b] = samples[from + 2 * b];
          ai[to + b] = samples[from + 2 * b + 1];
        }
      }
      runPasses(columnPlan, BATCH, 0, ar, ai, br, bi);
      for (let k = 0, from = 0; k < rows; k++) {
        const to = k * columns + column;
        for (let b = 0; b < BATCH; b++, from++) {
          const j = (column + b) * k;
          const fc = fineCos[j & fineMask];
          const fs = fineSin[j & fineMask];
          const cc = coarseCos[j >> fineBits];
          const cs = coarseSin[j >> fineBits];
          const c = fc * cc - fs * cs;
          const s = fs * cc + fc * cs;
          const r = columnRe[from];
          const i = columnIm[from];
          middleRe[to + b] = r * c + i * s;
          middleIm[to + b] = i * c - r * s;
        }
      }
    }
  };

  const transformRows = (re: Float64Array, im: Float64Array): void => {
    for (let row = 0; row < rows; row += BATCH) {
      for (let b = 0; b < BATCH; b++) {
        const from = (row + b) * columns;
        for (let n = 0, to = b; n < columns; n++, to += BATCH) {
          ar[to] = middleRe[from + n];
          ai[to] = middleIm[from + n];
        }
      }
      runPasses(rowPlan, BATCH, 0, ar, ai, br, bi);
      for (let k = 0, from = 0; k < columns; k++) {
        const to = k * rows + row;
        for (let b = 0; b < BATCH; b++, from++) {
          re[to + b] = rowRe[from];
          im[to + b] = rowIm[from];
        }
      }
    }
  };

  return (samples, re, im) => {
    transformColumns(samples);
    transformRows(re, im);
  };
}
