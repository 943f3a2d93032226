import { Button } from '@radix-ui/themes';
import { useEffect, useState } from 'react';
import { Section } from '@/components/page/page';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { formatSampleRate } from '@/lib/format/quantity';
import { listDevices } from '../audio/open-interface';
import { useLive, useLiveBench } from '../hooks/live-bench-context';
import { practiceDeviceOf, type PracticeFaults } from '../model/practice-faults';
import { RATES_HZ, type RigPick } from '../model/rig-pick';
import { PracticeSentence } from './practice-sentence';

interface RigSetupProps {
  pick: RigPick;
  faults: PracticeFaults;
  onPick: (pick: RigPick) => void;
  onFaults: (faults: PracticeFaults) => void;
}

const SYSTEM = 'system';

/** Before anything sounds: which way out and in, at which rate. */
export function RigSetup({ pick, faults, onPick, onFaults }: RigSetupProps) {
  const bench = useLiveBench();
  const rig = useLive((state) => state.rig);
  const devices = useDevices(rig);
  const isPractice = pick.kind === 'practice';
  const open = () =>
    void bench.open(
      isPractice
        ? { kind: 'practice', device: practiceDeviceOf(faults), sampleRateHz: pick.sampleRateHz }
        : { ...pick, kind: 'interface' },
    );
  return (
    <Section title="What is on the bench?">
      <Sentence>
        Work on{' '}
        <SlotSelect
          label="Bench"
          value={pick.kind}
          options={[
            { value: 'practice', label: 'the practice device', detail: 'no hardware, no sound' },
            { value: 'interface', label: 'an interface', detail: 'a real unit' },
          ]}
          onChange={(kind) => onPick({ ...pick, kind })}
        />
        {!isPractice && (
          <>
            {', out by '}
            <SlotSelect
              label="Output"
              value={pick.outputId || SYSTEM}
              options={optionsOf(devices.outputs, 'the system’s output')}
              onChange={(id) => onPick({ ...pick, outputId: id === SYSTEM ? '' : id })}
            />
            {' and in by '}
            <SlotSelect
              label="Input"
              value={pick.inputId || SYSTEM}
              options={optionsOf(devices.inputs, 'the system’s input')}
              onChange={(id) => onPick({ ...pick, inputId: id === SYSTEM ? '' : id })}
            />
          </>
        )}
        {', at '}
        <SlotSelect
          label="Sample rate"
          value={String(pick.sampleRateHz)}
          options={RATES_HZ.map((rate) => ({ value: String(rate), label: formatSampleRate(rate) }))}
          onChange={(rate) => onPick({ ...pick, sampleRateHz: Number(rate) })}
        />
        .
      </Sentence>
      {isPractice ? (
        <PracticeSentence faults={faults} onChange={onFaults} />
      ) : (
        <p className="bl-live-hint">
          The browser asks for the microphone the first time: it calls every input so. Names of inputs and
          outputs come after that. It must run at the interface’s own rate: set that in the system.
        </p>
      )}
      <p className="bl-live-open">
        <Button size="3" disabled={rig === 'opening'} onClick={open}>
          {rig === 'opening' ? 'Opening' : isPractice ? 'Open the practice device' : 'Open the interface'}
        </Button>
      </p>
    </Section>
  );
}

function optionsOf(devices: readonly MediaDeviceInfo[], system: string) {
  return [
    { value: SYSTEM, label: system },
    ...devices
      .filter(({ deviceId }) => deviceId !== 'default' && deviceId !== 'communications')
      .map(({ deviceId, label }, index) => ({ value: deviceId, label: label || `device ${index + 1}` })),
  ];
}

/** What is plugged in now, and again whenever that changes. */
function useDevices(rig: string) {
  const [devices, setDevices] = useState<Awaited<ReturnType<typeof listDevices>>>({
    inputs: [],
    outputs: [],
  });
  useEffect(() => {
    const media: MediaDevices | undefined = navigator.mediaDevices;
    if (!media) return;
    const read = () => void listDevices().then(setDevices);
    read();
    media.addEventListener('devicechange', read);
    return () => media.removeEventListener('devicechange', read);
  }, [rig]);
  return devices;
}
