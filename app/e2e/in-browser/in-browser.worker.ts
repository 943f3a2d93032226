import { bytesFromBlob, getMeasure, openWav, toCaptureFacts, toRecordJson } from '@benchlark/dsp';
import { expose } from 'comlink';
import { checks } from '../../../dsp/src/checks/checks';

export interface CheckResult {
  readonly id: string;
  readonly computed: number;
}

const inBrowserApi = {
  async runChecks(): Promise<CheckResult[]> {
    const results: CheckResult[] = [];
    for (const check of checks) results.push({ id: check.id, computed: await check.compute() });
    return results;
  },

  async analyse(file: File, measure: string): Promise<string> {
    const wav = await openWav(bytesFromBlob(file));
    const record = await getMeasure(measure).analyse(wav, {}, { capture: toCaptureFacts(wav, '') });
    return toRecordJson(record, { traces: 'none' });
  },
};
export type InBrowserApi = typeof inBrowserApi;

expose(inBrowserApi);
