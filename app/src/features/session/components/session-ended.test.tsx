import { act, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Person } from '@/lib/api-schema';
import { announceSignedOut } from '@/lib/session-events';
import { fakeServer, json } from '@/testing/fake-server';
import { renderPage } from '@/testing/render-page';
import { SessionEnded } from './session-ended';

const person = { id: 'p1', email: 'ilse@lantern-yard.example', roles: ['technician'] } as unknown as Person;

describe('a session that ends while somebody works', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
  });

  it('leaves the page and what was typed as they are, and goes on after signing in', async () => {
    fakeServer({ 'POST /api/session': () => json({ csrfToken: 'new', person: { id: 'p1' } }, 201) });
    renderPage(
      <>
        <textarea aria-label="Note" />
        <SessionEnded person={person} demo={null} />
      </>,
    );
    await userEvent.type(screen.getByLabelText('Note'), 'hum on the left');
    act(() => announceSignedOut());

    expect(await screen.findByRole('alertdialog', { name: 'Your session has ended' })).toBeInTheDocument();
    expect(screen.getByLabelText('E-mail')).toHaveValue('ilse@lantern-yard.example');
    await userEvent.type(screen.getByLabelText('Password'), 'three plain words');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));

    await waitFor(() => expect(screen.queryByRole('alertdialog')).not.toBeInTheDocument());
    expect(screen.getByLabelText('Note')).toHaveValue('hum on the left');
  });
});
