import { Theme } from '@radix-ui/themes';
import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter, Route, Routes, useLocation } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { placeOf, PLACES, placesFor } from './places';
import { Shell } from './shell';

function Where() {
  const { pathname, search } = useLocation();
  return <p data-testid="where">{pathname + search}</p>;
}

function open(roles: string[], onAddRecordings = vi.fn()) {
  render(
    <Theme>
      <MemoryRouter>
        <Shell
          person={{ displayName: 'Ines Varrow', roles }}
          onSignOut={vi.fn()}
          onAddRecordings={onAddRecordings}
        >
          <Routes>
            <Route path="*" element={<Where />} />
          </Routes>
          <input aria-label="Note" />
        </Shell>
      </MemoryRouter>
    </Theme>,
  );
  return onAddRecordings;
}

beforeEach(() => sessionStorage.clear());

describe('Shell', () => {
  it('shows the places that a role has', () => {
    open(['technician']);
    const labels = screen.getAllByRole('link').map((link) => link.textContent);
    expect(labels).toContain('Archive');
    expect(labels).not.toContain('People and audit');
    expect(screen.getByRole('link', { name: 'Today' })).toHaveAttribute('aria-current', 'page');
  });

  it('goes by g and a letter, and puts the focus on the new page', async () => {
    open(['technician']);
    await userEvent.keyboard('ga');
    expect(screen.getByTestId('where')).toHaveTextContent('/archive');
    expect(screen.getByRole('main')).toHaveFocus();
  });

  it('finds from anywhere with /', async () => {
    open(['technician']);
    await userEvent.keyboard('/');
    await waitFor(() => expect(screen.getByRole('searchbox')).toHaveFocus());
    await userEvent.keyboard('hum & buzz{Enter}');
    expect(screen.getByTestId('where')).toHaveTextContent('/archive?q=hum%20%26%20buzz');
  });

  it('adds recordings with u, but not while somebody writes', async () => {
    const onAdd = open(['technician']);
    await userEvent.type(screen.getByRole('textbox', { name: 'Note' }), 'gau/?');
    expect(onAdd).not.toHaveBeenCalled();
    expect(screen.getByTestId('where')).toHaveTextContent('/');
    (document.activeElement as HTMLElement).blur();
    await userEvent.keyboard('u');
    expect(onAdd).toHaveBeenCalledOnce();
  });

  it('lists its keys with ?', async () => {
    open(['technician']);
    await userEvent.keyboard('?');
    expect(await screen.findByRole('dialog', { name: 'Keys' })).toHaveTextContent('go to Archive');
  });

  it('folds to a spine and back, and / unfolds it', async () => {
    open(['technician']);
    await userEvent.click(screen.getByRole('button', { name: 'Fold' }));
    expect(screen.queryByRole('searchbox')).toBeNull();
    await userEvent.keyboard('/');
    await waitFor(() => expect(screen.getByRole('searchbox')).toHaveFocus());
  });
});

describe('places', () => {
  it('counts a capture to the archive and unknown paths to nothing', () => {
    expect(placeOf('/captures/1', PLACES)?.label).toBe('Archive');
    expect(placeOf('/units/7', PLACES)?.label).toBe('Units');
    expect(placeOf('/unitsandmore', PLACES)).toBeUndefined();
    expect(placesFor([]).map(({ label }) => label)).toEqual(['Today']);
  });
});
