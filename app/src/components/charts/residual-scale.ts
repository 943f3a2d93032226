/** How a residual against full scale is written on its axis. */
export interface ResidualScale {
  readonly factor: number;
  readonly unit: string;
}

const PERCENT: ResidualScale = { factor: 100, unit: '% of full scale' };
const PPM: ResidualScale = { factor: 1e6, unit: 'ppm of full scale' };
/** Below a hundredth of a percent the tick labels would be nothing but zeros. */
const LEAST_FOR_PERCENT = 1e-4;

/** Percent for what is coarse, millionths for what is fine; a unit other than full scale is left as it is. */
export function residualScale(yUnit: string, residuals: readonly Float64Array[]): ResidualScale {
  if (yUnit !== 'FS') return { factor: 1, unit: yUnit };
  const greatest = residuals.reduce(
    (most, residual) => residual.reduce((size, value) => Math.max(size, Math.abs(value)), most),
    0,
  );
  return greatest >= LEAST_FOR_PERCENT ? PERCENT : PPM;
}
