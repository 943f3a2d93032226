import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { ApiError } from '@/lib/api-error';
import { makeCapture } from '@/testing/make-capture';
import { renderPage } from '@/testing/render-page';
import type { UploadEntry } from '../model/upload-entry';
import { UploadRow } from './upload-row';

function show(change: Partial<UploadEntry>) {
  const entry: UploadEntry = {
    id: 'e1',
    file: new File([new Uint8Array(1000)], 'take 4.wav'),
    filing: {},
    phase: 'waiting',
    sentBytes: 0,
    startedAtMs: null,
    capture: null,
    analysis: null,
    error: null,
    ...change,
  };
  const acts = { onCancel: vi.fn(), onRetry: vi.fn(), onPutAway: vi.fn() };
  renderPage(
    <ul>
      <UploadRow entry={entry} {...acts} />
    </ul>,
  );
  return acts;
}

describe('a file on its way', () => {
  it('tells how much is sent and can be cancelled', async () => {
    const { onCancel } = show({ phase: 'sending', sentBytes: 620 });
    expect(screen.getByText(/62\s%\ssent/)).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Cancel take 4.wav' }));
    expect(onCancel).toHaveBeenCalledOnce();
    expect(screen.queryByRole('button', { name: /Put/ })).not.toBeInTheDocument();
  });

  it('tells why it was refused, where in the file, and what to do', async () => {
    const error = new ApiError(422, 'WAV_UNREADABLE', {
      title: 'Unreadable',
      detail: 'The data chunk is missing.',
      offset: 36,
      found: 'LIST',
      remedy: 'Export it again.',
    });
    const { onRetry } = show({ phase: 'refused', error });
    expect(
      screen.getByText(/The data chunk is missing\. Found: LIST\. Export it again\./),
    ).toBeInTheDocument();
    expect(screen.getByText('WAV_UNREADABLE, at byte 36')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Try take 4.wav again' }));
    expect(onRetry).toHaveBeenCalledOnce();
  });

  it('names the capture that holds the same bytes and leads to its own', () => {
    const capture = makeCapture({ id: 'c2', number: 32, sameBytesAs: [{ id: 'c1', number: 31 }] });
    show({ phase: 'stored', capture, analysis: { state: 'done', progress: null } });
    expect(screen.getByRole('link', { name: 'capture 31' })).toHaveAttribute('href', '/captures/c1');
    expect(screen.getByRole('link', { name: 'Capture 32' })).toHaveAttribute('href', '/captures/c2');
    expect(screen.getByText(/nothing is stored twice/)).toBeInTheDocument();
  });

  it('follows the analysis of what is stored', () => {
    show({ phase: 'stored', capture: makeCapture(), analysis: { state: 'analysing', progress: 0.4 } });
    expect(screen.getByText(/analysing, 40\s%/)).toBeInTheDocument();
  });
});
