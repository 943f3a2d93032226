import type { ReactNode } from 'react';
import { Sentence } from '@/components/sentence/slot';

/** What of a measure is shown, and against what: read as a sentence, changed by its words. */
export function ViewSentence({ children }: { children: ReactNode }) {
  return (
    <div className="bl-view-sentence">
      <Sentence>{children}</Sentence>
    </div>
  );
}
