import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { Columns, Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState } from '@/components/states/states';
import { MINUS } from '@/lib/format/number';
import { useStimulusFile } from '../hooks/use-stimulus-file';
import { useStimulusWorker } from '../hooks/use-stimulus-worker';
import { findEntry } from '../model/stimulus-catalogue';
import { readForm, refusedKey, withWord } from '../model/stimulus-form';
import { LevelCaution, PlayingAdvice } from './playing-advice';
import { StimulusList } from './stimulus-list';
import { StimulusContents } from './stimulus-contents';
import { StimulusFile } from './stimulus-file';
import { StimulusPreviewCharts, StimulusWhole } from './stimulus-preview';
import { StimulusSentence } from './stimulus-sentence';
import './stimuli.css';

/** Test signals: choose one, set its words, look at it, take it away as a file. */
export function StimuliPage() {
  const [params, setParams] = useSearchParams();
  const form = readForm(params);
  const entry = findEntry(form.name);
  const worker = useStimulusWorker();
  const preview = useQuery({
    queryKey: ['stimulus-preview', form.name, form.options],
    queryFn: () => worker().preview(form.name, form.options),
    staleTime: Infinity,
    gcTime: 60_000,
    retry: false,
  });
  const file = useStimulusFile(worker);
  const why = preview.error instanceof Error ? preview.error.message : null;
  const refused = why === null ? null : { key: refusedKey(why), why: sentenceOf(why) };
  const isExact = form.name === 'jitter-test' || form.name === 'programme';
  return (
    <Page>
      <PageHead
        title="Stimuli"
        sub="Test signals as files, each with a descriptor of what it holds."
        hasDivider
      />
      <Columns
        margin={
          <>
            <LevelCaution />
            <PlayingAdvice isExact={isExact} />
          </>
        }
      >
        <div className="bl-stimuli">
          <StimulusList chosen={form.name} params={params} />
          <div className="bl-stimulus">
            <h2 className="bl-stimulus-title">{entry.title}</h2>
            <p className="bl-ink-2">{entry.about}</p>
            <StimulusSentence
              form={form}
              refused={refused}
              onChange={(key, value) => setParams(withWord(params, key, value), { replace: true })}
            />
            {refused !== null && (
              <p role="alert" className="bl-stimulus-failed">
                {refused.why}
              </p>
            )}
            <StimulusFile
              form={form}
              preview={preview.data}
              state={file.state}
              onWrite={() => void file.write(form)}
              onCancel={file.cancel}
            />
            {preview.data && <StimulusWhole preview={preview.data} />}
          </div>
        </div>
        {preview.isPending && <LoadingState what="Drawing the stimulus" />}
        {refused?.key === null && (
          <FailedState
            what="The stimulus could not be drawn."
            why={refused.why}
            onRetry={() => void preview.refetch()}
          />
        )}
        {preview.data && (
          <>
            <StimulusPreviewCharts preview={preview.data} title={entry.title} />
            <StimulusContents preview={preview.data} ceilingDbfs={form.options.ceilingDbfs ?? 0} />
          </>
        )}
      </Columns>
    </Page>
  );
}

/** A refusal as a sentence of its own. */
function sentenceOf(why: string): string {
  const text = why.charAt(0).toUpperCase() + why.slice(1).replace(/(?<![\w-])-(?=\d)/g, MINUS);
  return text.endsWith('.') ? text : `${text}.`;
}
