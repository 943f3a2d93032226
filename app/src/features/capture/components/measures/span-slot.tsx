import { SlotSelect } from '@/components/sentence/slot';
import { RESPONSE_SPANS } from '../../model/response-model';
import type { ResponseSpan } from '../../model/response-model';

const OPTIONS = RESPONSE_SPANS.map((span) => ({
  value: span,
  label: span === 'full' ? 'all it covers' : `\u00b1${span}\u00a0dB`,
}));

interface SpanSlotProps {
  value: ResponseSpan;
  onChange: (span: ResponseSpan) => void;
}

/** How much of a response is drawn either side of zero. */
export function SpanSlot({ value, onChange }: SpanSlotProps) {
  return <SlotSelect label="Within" value={value} options={OPTIONS} onChange={onChange} />;
}
