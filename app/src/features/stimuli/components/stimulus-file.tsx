import { Button } from '@radix-ui/themes';
import { SpokenStatus } from '@/components/states/states';
import { formatBytes, formatDuration, formatHash, formatPercent } from '@/lib/format/quantity';
import type { FileState } from '../hooks/use-stimulus-file';
import { fileNameOf, type StimulusForm } from '../model/stimulus-form';
import type { StimulusPreview } from '../worker/preview';

export interface StimulusFileProps {
  form: StimulusForm;
  preview: StimulusPreview | undefined;
  state: FileState;
  onWrite: () => void;
  onCancel: () => void;
}

/** What the file is called and how large it will be; makes it. */
export function StimulusFile({ form, preview, state, onWrite, onCancel }: StimulusFileProps) {
  const fileName = fileNameOf(form);
  const isWriting = state.kind === 'writing';
  return (
    <div className="bl-stimulus-file">
      <p className="bl-ink-2">
        <code>{fileName}</code>
        {preview &&
          `, ${formatDuration(preview.durationS)}, ${formatBytes(preview.sizeBytes)}; its descriptor beside it`}
      </p>
      <div className="bl-stimulus-file-doing">
        <Button onClick={onWrite} disabled={!preview || isWriting}>
          Make the file
        </Button>
        {isWriting && (
          <>
            <progress aria-label="Written" value={state.share} max={1} />
            <span className="bl-ink-2">{formatPercent(state.share)} written</span>
            <Button color="gray" highContrast onClick={onCancel}>
              Stop writing
            </Button>
          </>
        )}
      </div>
      {state.kind === 'written' && (
        <SpokenStatus>
          {state.fileName} and its descriptor are in your downloads. SHA-256 {formatHash(state.sha256)}.
        </SpokenStatus>
      )}
      {state.kind === 'failed' && (
        <p role="alert" className="bl-stimulus-failed">
          The file could not be made: {state.why}. Change the words above, or try again.
        </p>
      )}
    </div>
  );
}
