import { AlertDialog, Button, Checkbox, Flex } from '@radix-ui/themes';
import { useState } from 'react';
import { formatLevel } from '@/lib/format/quantity';
import { voltsWords, type RigUse } from '../model/rig-use';

interface CautionDialogProps {
  isOpen: boolean;
  levelDbfs: number;
  use: RigUse;
  onOpenChange: (isOpen: boolean) => void;
  onConfirm: () => void;
}

const CHECKS = [
  'No loudspeaker and no headphone is on the output.',
  'The unit’s volume is down, and what it drives can take its power.',
  'Nobody’s hands are at mains or other live parts.',
] as const;

/** Before the first sound of an opened rig. The button stays off until every box is ticked. */
export function CautionDialog({ isOpen, levelDbfs, use, onOpenChange, onConfirm }: CautionDialogProps) {
  const [ticked, setTicked] = useState<readonly number[]>([]);
  const isReady = ticked.length === CHECKS.length;
  const close = (next: boolean) => {
    setTicked([]);
    onOpenChange(next);
  };
  return (
    <AlertDialog.Root open={isOpen} onOpenChange={close}>
      <AlertDialog.Content maxWidth="480px">
        <AlertDialog.Title size="4">Sound is about to leave the computer</AlertDialog.Title>
        <AlertDialog.Description size="2">
          Up to {formatLevel(levelDbfs)}
          {use.outputVrms !== null && `, ${voltsWords(use.outputVrms, levelDbfs)}`}. At full scale a test tone
          can destroy tweeters and hearing within a second. A steady tone starts at{' '}
          {formatLevel(Math.min(-40, levelDbfs))} and rises over 3 s;{' '}
          {use.limitDbfs < 0
            ? `this rig never plays above ${formatLevel(use.limitDbfs)}.`
            : 'this rig has no limit of its own.'}{' '}
          Esc stops it at any time. Where mains or high voltages are within reach, ask somebody qualified and
          keep to your local rules.
        </AlertDialog.Description>
        <Flex direction="column" gap="2" mt="4">
          {CHECKS.map((words, index) => (
            <label key={words} className="bl-live-check">
              <Checkbox
                checked={ticked.includes(index)}
                onCheckedChange={(isTicked) =>
                  setTicked(isTicked ? [...ticked, index] : ticked.filter((one) => one !== index))
                }
              />
              {words}
            </label>
          ))}
        </Flex>
        <Flex gap="3" mt="4" justify="end" wrap="wrap">
          <AlertDialog.Cancel>
            <Button variant="surface" color="gray" highContrast>
              Not yet
            </Button>
          </AlertDialog.Cancel>
          <Button
            disabled={!isReady}
            onClick={() => {
              close(false);
              onConfirm();
            }}
          >
            Play
          </Button>
        </Flex>
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
