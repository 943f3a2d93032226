import { SlotSelect } from '@/components/sentence/slot';
import { kindOf, type StimulusForm } from '../model/stimulus-form';

/** Channels, dither, and what stands around the body. */
export function StimulusWays({
  form: { name, options },
  onChange,
}: {
  form: StimulusForm;
  onChange: (key: string, value: string | null) => void;
}) {
  const kind = kindOf(name);
  const isFloat = options.bitsPerSample === '32f';
  return (
    <>
      {!kind.isBothOnly && (
        <>
          {', in '}
          <SlotSelect
            label="Channels"
            value={options.channels ?? 'both'}
            options={[
              { value: 'both', label: 'both channels' },
              { value: 'left', label: 'left alone' },
              { value: 'right', label: 'right alone' },
            ]}
            onChange={(value) => onChange('channels', value === 'both' ? null : value)}
          />
        </>
      )}
      {kind.isDithered && !isFloat && (
        <>
          {', '}
          <SlotSelect
            label="Dither"
            value={options.dither ?? 'tpdf'}
            options={[
              { value: 'tpdf', label: 'dithered', detail: 'triangular, two steps wide' },
              { value: 'none', label: 'without dither', detail: 'rounding shows as distortion' },
            ]}
            onChange={(value) => onChange('dither', value === 'none' ? 'none' : null)}
          />
        </>
      )}
      {!kind.isDigitalZero && (
        <>
          {', '}
          <SlotSelect
            label="Around it"
            value={options.isBare ? 'bare' : 'marked'}
            options={[
              {
                value: 'marked',
                label: 'with lead-in and marks',
                detail: 'found by itself in any recording',
              },
              { value: 'bare', label: 'bare', detail: 'the signal alone: needs its descriptor' },
            ]}
            onChange={(value) => onChange('bare', value === 'bare' ? 'yes' : null)}
          />
        </>
      )}
    </>
  );
}
