import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Unit } from '@/lib/api-schema';
import { fakeServer, json, problem } from '@/testing/fake-server';
import { renderPage } from '@/testing/render-page';
import { UnitDialog } from './unit-dialog';

const unit: Unit = {
  id: 'u1',
  maker: 'Halden Audio',
  model: 'Fjell 2',
  serialNumber: 'HF2-0231',
  kind: 'headphone-amplifier',
  notes: '',
  createdAt: '2026-11-02T09:00:00.000Z',
  captureCount: 0,
  conditions: [],
};

describe('the form of a unit', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
  });

  it('leaves out an empty serial number of a new unit', async () => {
    const { requests } = fakeServer({ 'POST /api/units': () => json({ ...unit, id: 'u9' }, 201) });
    const onSaved = vi.fn();
    renderPage(<UnitDialog isOpen onOpenChange={vi.fn()} onSaved={onSaved} />);
    await userEvent.type(screen.getByLabelText('Maker'), 'Halden Audio');
    await userEvent.type(screen.getByLabelText('Model'), '  Fjell 2 ');
    await userEvent.click(screen.getByRole('button', { name: 'Put it on the books' }));
    await vi.waitFor(() => expect(onSaved).toHaveBeenCalledWith('u9'));
    expect(await requests[0]!.json()).toEqual({
      maker: 'Halden Audio',
      model: 'Fjell 2',
      kind: 'converter',
      notes: '',
    });
  });

  it('clears a serial number that was emptied', async () => {
    const { requests } = fakeServer({ 'PATCH /api/units/u1': () => json(unit) });
    renderPage(<UnitDialog unit={unit} isOpen onOpenChange={vi.fn()} onSaved={vi.fn()} />);
    await userEvent.clear(screen.getByLabelText('Serial number'));
    await userEvent.click(screen.getByRole('button', { name: 'Keep the change' }));
    await vi.waitFor(() => expect(requests).not.toHaveLength(0));
    expect(await requests[0]!.json()).toMatchObject({ serialNumber: null });
  });

  it('puts the server\u2019s refusal at its field', async () => {
    fakeServer({
      'POST /api/units': () =>
        problem(409, {
          title: 'Exists',
          code: 'CONFLICT',
          fields: { serialNumber: ['This number is on the books'] },
        }),
    });
    renderPage(<UnitDialog isOpen onOpenChange={vi.fn()} onSaved={vi.fn()} />);
    await userEvent.type(screen.getByLabelText('Maker'), 'Halden Audio');
    await userEvent.type(screen.getByLabelText('Model'), 'Fjell 2');
    await userEvent.type(screen.getByLabelText('Serial number'), 'HF2-0231');
    await userEvent.click(screen.getByRole('button', { name: 'Put it on the books' }));
    expect(await screen.findByText('This number is on the books')).toBeInTheDocument();
    expect(screen.getByLabelText('Serial number')).toBeInvalid();
  });
});
