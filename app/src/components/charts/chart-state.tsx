import { Button } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { InkingWave } from '../states/inking-wave';

/** Whether a chart's traces are there, and what to say while they aren't. */
export type ChartState =
  | { readonly kind: 'ready' }
  | { readonly kind: 'empty'; readonly children: ReactNode }
  | {
      readonly kind: 'loading';
      readonly what: string;
      readonly share?: number | null;
      readonly amount?: string;
    }
  | {
      readonly kind: 'failed';
      readonly what: string;
      readonly why?: string | null;
      readonly isRecordSafe?: boolean;
      readonly onRetry?: () => void;
    };

/** Words over the bare graticule. */
export function ChartStateWords({ state }: { state: Exclude<ChartState, { kind: 'ready' }> }) {
  if (state.kind === 'empty') return <div className="bl-chart-state">{state.children}</div>;
  if (state.kind === 'loading') {
    return (
      <div className="bl-chart-state">
        <InkingWave share={state.share} label={state.what} />
        <p role="status">{state.amount ? `${state.what}, ${state.amount}` : state.what}</p>
      </div>
    );
  }
  return (
    <div className="bl-chart-state" role="alert">
      <p>
        <strong>{state.what}</strong>
      </p>
      {(state.why || state.isRecordSafe) && (
        <p>
          {state.why} {state.isRecordSafe && 'The record is safe.'}
        </p>
      )}
      {state.onRetry && (
        <Button variant="surface" color="gray" highContrast onClick={state.onRetry}>
          Try again
        </Button>
      )}
    </div>
  );
}
