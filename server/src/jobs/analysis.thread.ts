import { parentPort, workerData } from 'node:worker_threads';
import { analyseCapture, DspInputError, openWav } from '@benchlark/dsp';
import { openFileBytes } from '../files/file-bytes';
import type { AnalysisOutcome, ThreadMessage } from './analysis-thread-messages';
import { makeOverview } from './overview';
import type { AnalysisInput } from './run-analysis';

/** Reading every sample once takes about this share of the whole time. */
const OVERVIEW_SHARE = 0.2;

function say(message: ThreadMessage): void {
  parentPort?.postMessage(message);
}

async function analyse({ path, sha256, measure, settings }: AnalysisInput): Promise<AnalysisOutcome> {
  const bytes = await openFileBytes(path);
  try {
    const wav = await openWav(bytes);
    const overview = await makeOverview(wav, (share) =>
      say({ kind: 'progress', share: share * OVERVIEW_SHARE }),
    );
    const { record, recognition } = await analyseCapture(
      wav,
      sha256,
      { measure: measure ?? undefined, settings },
      {
        onProgress: (share) =>
          say({ kind: 'progress', share: OVERVIEW_SHARE + share * (1 - OVERVIEW_SHARE) }),
      },
    );
    const recognisedAs = recognition ? `${recognition.measure}: ${recognition.why}` : null;
    return { record, overview, recognisedAs };
  } finally {
    await bytes.close();
  }
}

analyse(workerData as AnalysisInput).then(
  (outcome) => say({ kind: 'outcome', outcome }),
  (error: unknown) => {
    if (error instanceof DspInputError) {
      say({ kind: 'refused', code: error.code, message: error.message, details: error.details });
    } else {
      say({ kind: 'crashed', message: error instanceof Error ? error.message : String(error) });
    }
  },
);
