/** One value that dsp must give, runnable in Node and in a browser's worker alike. */
export interface Check {
  readonly id: string;
  /** Where the expected value comes from. */
  readonly source: string;
  readonly expected: number;
  /** Greatest difference allowed, in `unit`. */
  readonly tolerance: number;
  readonly unit: string;
  compute(): number | Promise<number>;
}
