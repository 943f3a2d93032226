import { useEffect, useEffectEvent, useState } from 'react';
import { readDroppedFiles } from '../model/dropped-files';
import type { DroppedFiles } from '../model/dropped-files';

/** Files may be dropped anywhere on the page. Tells whether some are being held over it now. */
export function useDropAnywhere(isEnabled: boolean, onDropped: (dropped: DroppedFiles) => void): boolean {
  const [isOver, setIsOver] = useState(false);
  const take = useEffectEvent(onDropped);

  useEffect(() => {
    if (!isEnabled) return;
    // Every element under the pointer enters and leaves in turn: only the count tells when the page was left.
    let depth = 0;
    const holdsFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const onEnter = (event: DragEvent) => {
      if (!holdsFiles(event)) return;
      event.preventDefault();
      depth += 1;
      setIsOver(true);
    };
    const onOver = (event: DragEvent) => {
      if (holdsFiles(event)) event.preventDefault();
    };
    const onLeave = (event: DragEvent) => {
      if (!holdsFiles(event)) return;
      depth = Math.max(0, depth - 1);
      if (depth === 0) setIsOver(false);
    };
    const onDrop = (event: DragEvent) => {
      if (!event.dataTransfer || !holdsFiles(event)) return;
      event.preventDefault();
      depth = 0;
      setIsOver(false);
      void readDroppedFiles(event.dataTransfer).then(take);
    };
    window.addEventListener('dragenter', onEnter);
    window.addEventListener('dragover', onOver);
    window.addEventListener('dragleave', onLeave);
    window.addEventListener('drop', onDrop);
    return () => {
      window.removeEventListener('dragenter', onEnter);
      window.removeEventListener('dragover', onOver);
      window.removeEventListener('dragleave', onLeave);
      window.removeEventListener('drop', onDrop);
    };
  }, [isEnabled]);

  return isOver;
}
