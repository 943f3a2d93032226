import { Button } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { Lark } from '../lark';
import { InkingWave } from './inking-wave';
import './states.css';

export interface LoadingStateProps {
  /** A sentence without full stop: "Fetching the record". */
  what: string;
  share?: number | null;
  /** "0.4 of 1.1 MB" */
  amount?: string;
}

/** On its way: the wave inks in, the words say what and how much. */
export function LoadingState({ what, share, amount }: LoadingStateProps) {
  return (
    <div className="bl-state">
      <InkingWave share={share} label={what} />
      <p role="status">{amount ? `${what}, ${amount}` : what}</p>
    </div>
  );
}

export interface FailedStateProps {
  /** What happened, a sentence: "The record could not be fetched." */
  what: string;
  /** Why and what now, from the server's own words. */
  why?: string | null;
  /** Say so where what was asked for is stored safely. */
  isRecordSafe?: boolean;
  onRetry?: () => void;
  children?: ReactNode;
}

/** It went wrong: what, why, what now. */
export function FailedState({ what, why, isRecordSafe = false, onRetry, children }: FailedStateProps) {
  return (
    <div className="bl-state" role="alert">
      <p>
        <strong>{what}</strong>
      </p>
      {(why || isRecordSafe) && (
        <p>
          {why} {isRecordSafe && 'The record is safe.'}
        </p>
      )}
      {onRetry && (
        <Button variant="surface" color="gray" highContrast onClick={onRetry}>
          Try again
        </Button>
      )}
      {children}
    </div>
  );
}

export interface NoRowsProps {
  /** What was asked and not found, a sentence. */
  asked: string;
  /** How to widen it, with links or word buttons. */
  children?: ReactNode;
}

/** No rows: the lark, what was asked, how to widen it. */
export function NoRows({ asked, children }: NoRowsProps) {
  return (
    <div className="bl-no-rows">
      <Lark sizePx={44} />
      <p>
        <strong>{asked}</strong>
      </p>
      {children && <div className="bl-no-rows-widen">{children}</div>}
    </div>
  );
}

/** A sentence said aloud when it changes, and seen by no one: what an action came to. */
export function SpokenStatus({ children }: { children: ReactNode }) {
  return (
    <p className="bl-hidden" role="status">
      {children}
    </p>
  );
}
