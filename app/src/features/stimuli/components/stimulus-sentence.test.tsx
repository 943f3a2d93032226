import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { renderPage } from '@/testing/render-page';
import { readForm } from '../model/stimulus-form';
import { StimulusSentence } from './stimulus-sentence';

function draw(address: string) {
  const onChange = vi.fn();
  const form = readForm(new URLSearchParams(address));
  renderPage(<StimulusSentence form={form} refused={null} onChange={onChange} />);
  return onChange;
}

describe('the sentence of a stimulus', () => {
  it('takes another seed, and leaves the usual one out of the address', async () => {
    const onChange = draw('name=white-noise&seed=9');
    await userEvent.click(screen.getByRole('button', { name: 'Seed, 9' }));
    const field = screen.getByRole('textbox', { name: 'Seed' });
    await userEvent.clear(field);
    await userEvent.type(field, '12{Enter}');
    expect(onChange).toHaveBeenLastCalledWith('seed', '12');
    await userEvent.click(screen.getByRole('button', { name: 'Seed, 9' }));
    await userEvent.clear(screen.getByRole('textbox', { name: 'Seed' }));
    await userEvent.type(screen.getByRole('textbox', { name: 'Seed' }), '1{Enter}');
    expect(onChange).toHaveBeenLastCalledWith('seed', null);
  });

  it.each([
    { address: 'name=sine', is: true },
    { address: 'name=sine&dither=none', is: false },
    { address: 'name=sine&bits=32f', is: false },
    { address: 'name=pink-noise&bits=32f', is: true },
    { address: 'name=jitter-test', is: false },
    { address: 'name=silence', is: false },
  ])('$address asks for a seed: $is', ({ address, is }) => {
    draw(address);
    expect(screen.queryByRole('button', { name: /^Seed, / }) !== null).toBe(is);
  });
});
