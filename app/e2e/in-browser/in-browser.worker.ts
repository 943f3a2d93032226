import {
  analyseCapture,
  bytesFromBlob,
  openWav,
  toRecordJson,
  type BenchRecord,
  type MeasureId,
} from '@benchlark/dsp';
import { expose } from 'comlink';
import { allChecks } from '../../../dsp/src/checks/all-checks';

export interface CheckResult {
  readonly id: string;
  readonly computed: number;
}

const inBrowserApi = {
  async runChecks(): Promise<CheckResult[]> {
    const results: CheckResult[] = [];
    for (const check of allChecks) results.push({ id: check.id, computed: await check.compute() });
    return results;
  },

  async analyse(file: File, measure: MeasureId): Promise<BenchRecord> {
    const { record } = await analyseCapture(await openWav(bytesFromBlob(file)), '', { measure });
    return toRecordJson(record, { traces: 'none' });
  },
};
export type InBrowserApi = typeof inBrowserApi;

expose(inBrowserApi);
