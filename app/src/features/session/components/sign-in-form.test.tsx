import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { fakeServer, json, problem } from '@/testing/fake-server';
import { renderPage } from '@/testing/render-page';
import { SignInForm } from './sign-in-form';

const demo = {
  accounts: [
    {
      displayName: 'Ilse Varga',
      email: 'ilse@lantern-yard.example',
      password: 'three plain words',
      roles: ['technician' as const],
    },
  ],
};

describe('the sign-in', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
  });

  it('says what is missing at the field and sends nothing', async () => {
    const { requests } = fakeServer({});
    renderPage(<SignInForm demo={null} onSignedIn={vi.fn()} />);
    await userEvent.type(screen.getByLabelText('E-mail'), 'ilse');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(await screen.findByText('This does not read as an e-mail address')).toBeInTheDocument();
    expect(screen.getByLabelText('E-mail')).toHaveAccessibleDescription(
      'This does not read as an e-mail address',
    );
    expect(screen.getByText('Type your password')).toBeInTheDocument();
    expect(requests).toHaveLength(0);
  });

  it('fills in a demonstration\u2019s person by one press and hands on the session', async () => {
    const session = { csrfToken: 'new', person: { id: 'p1' } };
    const { requests } = fakeServer({ 'POST /api/session': () => json(session, 201) });
    const onSignedIn = vi.fn();
    renderPage(<SignInForm demo={demo} onSignedIn={onSignedIn} />);
    await userEvent.click(screen.getByRole('button', { name: /Fill in as Ilse Varga/ }));
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    await vi.waitFor(() => expect(onSignedIn).toHaveBeenCalledWith(session));
    expect(await requests[0]!.json()).toEqual({
      email: 'ilse@lantern-yard.example',
      password: 'three plain words',
    });
  });

  it('keeps what was typed when the server refuses, and says why', async () => {
    fakeServer({
      'POST /api/session': () =>
        problem(401, {
          title: 'Not signed in',
          code: 'SIGN_IN_FAILED',
          detail: 'E-mail or password is wrong.',
        }),
    });
    renderPage(<SignInForm demo={null} onSignedIn={vi.fn()} />);
    await userEvent.type(screen.getByLabelText('E-mail'), 'ilse@lantern-yard.example');
    await userEvent.type(screen.getByLabelText('Password'), 'not this one');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(await screen.findByText('E-mail or password is wrong.')).toBeInTheDocument();
    expect(screen.getByLabelText('E-mail')).toHaveValue('ilse@lantern-yard.example');
  });
});
