import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { FilingSlots } from '@/components/filing/filing-slots';
import { NewRigDialog } from '@/components/filing/new-rig-dialog';
import { FormError, TextAreaInput } from '@/components/forms/field';
import { MarginBlock } from '@/components/page/page';
import { Sentence } from '@/components/sentence/slot';
import { SpokenStatus } from '@/components/states/states';
import type { Capture } from '@/lib/api-schema';
import { unitName } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { useFilingChoices } from '@/lib/use-filing-choices';
import { useFileCapture } from '../api/capture-actions';

/** Where the capture belongs. A changed word is kept at once; the note when it is left or by its button. */
export function CaptureFiling({ capture, canWrite }: { capture: Capture; canWrite: boolean }) {
  const { units, rigs } = useFilingChoices();
  const file = useFileCapture(capture.id);
  const [isNamingRig, setIsNamingRig] = useState(false);
  if (!canWrite) {
    return (
      <MarginBlock title="Filed under">
        <p>
          {capture.unit ? unitName(capture.unit) : 'No unit yet'}
          {capture.condition && `, ${capture.condition.name}`}
          {capture.rig && `, on ${capture.rig.name}`}.
        </p>
        {capture.note !== '' && <p className="bl-capture-note">{capture.note}</p>}
      </MarginBlock>
    );
  }
  return (
    <MarginBlock title="Filed under">
      <Sentence>
        <FilingSlots
          units={units}
          rigs={rigs}
          value={{
            unitId: capture.unit?.id ?? null,
            conditionId: capture.condition?.id ?? null,
            rigId: capture.rig?.id ?? null,
          }}
          onChange={(filing) => file.mutate(filing)}
          onNewRig={() => setIsNamingRig(true)}
        />
        .
      </Sentence>
      <NoteForm
        key={capture.note}
        note={capture.note}
        isBusy={file.isPending}
        onKeep={(note) => file.mutate({ note })}
      />
      {file.error && <FormError>{errorWords(file.error)}</FormError>}
      <SpokenStatus>{file.isSuccess ? 'Filed' : ''}</SpokenStatus>
      <NewRigDialog
        isOpen={isNamingRig}
        onOpenChange={setIsNamingRig}
        onMade={(rig) => file.mutate({ rigId: rig.id })}
      />
    </MarginBlock>
  );
}

interface NoteFormProps {
  note: string;
  isBusy: boolean;
  onKeep: (note: string) => void;
}

function NoteForm({ note, isBusy, onKeep }: NoteFormProps) {
  const [typed, setTyped] = useState(note);
  return (
    <form
      onSubmit={(event) => {
        event.preventDefault();
        onKeep(typed.trim());
      }}
    >
      <TextAreaInput
        label="Note"
        value={typed}
        maxLength={4000}
        onChange={({ target }) => setTyped(target.value)}
      />
      {typed.trim() !== note && (
        <p className="bl-capture-keep">
          <Button type="submit" variant="surface" color="gray" highContrast disabled={isBusy}>
            Keep the note
          </Button>
        </p>
      )}
    </form>
  );
}
