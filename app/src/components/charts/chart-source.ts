/** Where a chart's traces come from; stands under every export. */
export interface ChartSource {
  /** The record's id, or null for a reading that isn't stored. */
  readonly recordId: string | null;
  /** When it was recorded or analysed, ISO 8601. */
  readonly date: string;
  /** One line: unit under test, condition, rig, band. */
  readonly conditions: string;
  /** Name of exported files without their ending: "capture-2031-spectrum". */
  readonly fileStem: string;
}
