import { Button, Dialog, Flex } from '@radix-ui/themes';
import { KeyCap } from '../key-cap';
import type { Place } from './places';

const PAGE_KEYS: readonly (readonly [readonly string[], string])[] = [
  [['/'], 'find'],
  [['U'], 'add recordings'],
  [['?'], 'these keys'],
];
const CHART_KEYS: readonly (readonly [readonly string[], string])[] = [
  [['←', '→'], 'the cursor by a point, with Shift by ten'],
  [['Home', 'End'], 'the first and last point'],
  [['N'], 'the next harmonic, with Shift the one before'],
  [['Z'], 'start a zoom at the cursor, then Enter to take it'],
  [['+', '-'], 'closer and further at the cursor'],
  [['0'], 'all of the chart again'],
];

const LIVE_KEYS: readonly (readonly [readonly string[], string])[] = [
  [['Space'], 'play, or start the take'],
  [['Esc'], 'stop every sound'],
  [['H'], 'hold the picture, and go on'],
  [['K'], 'keep the take'],
  [['M'], 'make a note'],
];

function KeyRows({ rows }: { rows: readonly (readonly [readonly string[], string])[] }) {
  return (
    <dl className="bl-keys">
      {rows.map(([keys, words]) => (
        <div key={words}>
          <dt>
            {keys.map((key) => (
              <KeyCap key={key}>{key}</KeyCap>
            ))}
          </dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}

/** Every key that does something, by where it does. */
export function KeysDialog({
  isOpen,
  onOpenChange,
  places,
}: {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  places: readonly Place[];
}) {
  const goKeys = places.map(({ goKey, label }) => [['G', goKey.toUpperCase()], `go to ${label}`] as const);
  return (
    <Dialog.Root open={isOpen} onOpenChange={onOpenChange}>
      <Dialog.Content maxWidth="520px" aria-describedby={undefined}>
        <Dialog.Title size="4">Keys</Dialog.Title>
        <h2 className="bl-keys-head">On every page</h2>
        <KeyRows rows={[...PAGE_KEYS, ...goKeys]} />
        <h2 className="bl-keys-head">On the Live page</h2>
        <KeyRows rows={LIVE_KEYS} />
        <h2 className="bl-keys-head">On a chart that has the focus</h2>
        <KeyRows rows={CHART_KEYS} />
        <Flex mt="4" justify="end">
          <Dialog.Close>
            <Button variant="surface" color="gray" highContrast>
              Close
            </Button>
          </Dialog.Close>
        </Flex>
      </Dialog.Content>
    </Dialog.Root>
  );
}
