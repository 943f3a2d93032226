import { Theme } from '@radix-ui/themes';
import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { FailedState, LoadingState, NoRows } from './states';

describe('states', () => {
  it('says what is on its way, how much of it, and inks the wave in', () => {
    const { container } = render(
      <LoadingState what="Fetching the trace" share={0.4} amount="0.4 of 1.1 MB" />,
    );
    expect(screen.getByRole('progressbar', { name: 'Fetching the trace' })).toHaveAttribute(
      'aria-valuenow',
      '40',
    );
    expect(screen.getByRole('status')).toHaveTextContent('Fetching the trace, 0.4 of 1.1 MB');
    expect(Number(container.querySelector('clipPath rect')?.getAttribute('width'))).toBeCloseTo(0.4 * 136);
  });

  it('claims no amount while none is known', () => {
    render(<LoadingState what="Opening" />);
    expect(screen.getByRole('progressbar')).not.toHaveAttribute('aria-valuenow');
  });

  it('says what failed, that the record is safe, and tries again', async () => {
    const onRetry = vi.fn();
    render(
      <Theme>
        <FailedState
          what="The trace could not be fetched."
          why="The server did not answer in 30 s."
          isRecordSafe
          onRetry={onRetry}
        />
      </Theme>,
    );
    expect(screen.getByRole('alert')).toHaveTextContent(
      'The server did not answer in 30 s. The record is safe.',
    );
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(onRetry).toHaveBeenCalledOnce();
  });

  it('says what was asked and how to widen it', () => {
    render(<NoRows asked="No capture of this unit.">Widen the sentence above.</NoRows>);
    expect(screen.getByText('No capture of this unit.')).toBeInTheDocument();
    expect(screen.getByText('Widen the sentence above.')).toBeInTheDocument();
  });
});
