import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Capture } from '@/lib/api-schema';
import { fakeServer, json, problem } from '@/testing/fake-server';
import { makeCapture } from '@/testing/make-capture';
import { makePerson } from '@/testing/make-person';
import { renderPage } from '@/testing/render-page';
import { ArchiveList } from './archive-list';

const captures = [
  makeCapture({ id: 'c3', number: 33, uploadedAt: '2026-11-19T10:40:00.000Z', fileName: 'third.wav' }),
  makeCapture({ id: 'c2', number: 32, uploadedAt: '2026-11-19T09:00:00.000Z', fileName: 'second.wav' }),
  makeCapture({
    id: 'c1',
    number: 31,
    uploadedAt: '2026-11-12T12:00:00.000Z',
    fileName: 'first.wav',
    state: 'failed',
  }),
];

const page = (items: readonly Capture[], nextCursor: string | null = null) =>
  json({ items, nextCursor, total: items.length, totalAll: 40, totalBytes: 1 });

function show(address: string, answers: Parameters<typeof fakeServer>[0] = {}, roles = makePerson().roles) {
  const server = fakeServer({
    'GET /api/captures': () => page(captures),
    'GET /api/units': () => json({ items: [], nextCursor: null, total: 0 }),
    'GET /api/rigs': () => json({ items: [{ id: 'r1', name: 'Yard rig', notes: '', createdAt: '' }] }),
    ...answers,
  });
  const view = renderPage(<ArchiveList />, { path: '/archive', address, person: makePerson({ roles }) });
  const asked = () =>
    server.requests
      .filter(({ url, method }) => method === 'GET' && new URL(url).pathname === '/api/captures')
      .map(({ url }) => new URL(url).searchParams);
  return { ...view, ...server, asked };
}

describe('the archive', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
  });

  it('asks the server what the address says, and says how many there are', async () => {
    const { asked } = show('/archive?unit=none&measure=tone&sort=fileName&order=asc');
    expect(await screen.findByText('3 of 40, by file name')).toBeInTheDocument();
    expect(Object.fromEntries(asked()[0]!)).toMatchObject({
      unsorted: 'true',
      measure: 'tone',
      sort: 'fileName',
      order: 'asc',
    });
  });

  it('puts one day beside all of its rows', async () => {
    show('/archive');
    const days = await screen.findAllByRole('rowheader');
    expect(days.map((day) => day.getAttribute('rowspan'))).toEqual(['2', '1']);
  });

  it('writes words into the address once the typing pauses', async () => {
    const { router, asked } = show('/archive');
    await userEvent.type(await screen.findByLabelText('Words'), 'hum');
    await waitFor(() => expect(router.state.location.search).toBe('?q=hum'));
    await waitFor(() => expect(asked().at(-1)!.get('q')).toBe('hum'));
    expect(asked().filter((params) => params.has('q'))).toHaveLength(1);
  });

  it('sorts by a press on a head, and turns it round by another', async () => {
    const { router } = show('/archive');
    await userEvent.click(await screen.findByRole('button', { name: 'unit and condition' }));
    expect(router.state.location.search).toBe('?sort=unit&order=asc');
    await userEvent.click(screen.getByRole('button', { name: 'unit and condition' }));
    expect(router.state.location.search).toBe('?sort=unit');
  });

  it('keeps the chosen rows in the address, Shift takes those between, and files them one by one', async () => {
    const { router, requests } = show('/archive', {
      'PATCH /api/captures/c2': () => json(captures[1]),
      'PATCH /api/captures/c3': () => json(captures[0]),
    });
    const user = userEvent.setup();
    await user.click(await screen.findByRole('checkbox', { name: 'Choose capture 33' }));
    await user.keyboard('{Shift>}');
    await user.click(screen.getByRole('checkbox', { name: 'Choose capture 32' }));
    await user.keyboard('{/Shift}');
    expect(router.state.location.search).toBe('?chosen=32%2C33');

    const bar = screen.getByRole('region', { name: 'Chosen captures' });
    await user.click(within(bar).getByRole('button', { name: 'Rig, no rig named' }));
    await user.click(await screen.findByRole('menuitemradio', { name: 'Yard rig' }));
    await user.click(within(bar).getByRole('button', { name: 'File them there' }));
    await waitFor(() => expect(router.state.location.search).toBe(''));
    const filed = requests.filter(({ method }) => method === 'PATCH');
    expect(filed.map(({ url }) => new URL(url).pathname)).toEqual(['/api/captures/c3', '/api/captures/c2']);
    expect(await filed[0]!.json()).toEqual({ unitId: null, conditionId: null, rigId: 'r1' });
  });

  it('lets nobody choose who may only read', async () => {
    show('/archive', {}, ['administrator']);
    expect(await screen.findByRole('link', { name: '33' })).toBeInTheDocument();
    expect(screen.queryByRole('checkbox')).not.toBeInTheDocument();
  });

  it('shows more from where the last page ended', async () => {
    const { asked } = show('/archive', {
      'GET /api/captures': ({ url }) =>
        new URL(url).searchParams.has('cursor')
          ? page(captures.slice(2))
          : page(captures.slice(0, 2), 'after-32'),
    });
    await userEvent.click(await screen.findByRole('button', { name: 'Show more' }));
    expect(await screen.findByRole('link', { name: '31' })).toBeInTheDocument();
    expect(asked().at(-1)!.get('cursor')).toBe('after-32');
    expect(screen.queryByRole('button', { name: 'Show more' })).not.toBeInTheDocument();
  });

  it('says what was asked when nothing fits, and how to widen it', async () => {
    const { router } = show('/archive?state=failed', { 'GET /api/captures': () => page([]) });
    expect(await screen.findByText('No capture fits this sentence.')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'show all captures' }));
    expect(router.state.location.search).toBe('');
  });

  it('says why it could not be fetched, and tries again', async () => {
    let isDown = true;
    show('/archive', {
      'GET /api/captures': () =>
        isDown
          ? problem(503, { title: 'Not ready', code: 'UNAVAILABLE', detail: 'The database is away.' })
          : page(captures),
    });
    expect(await screen.findByText(/The database is away\./)).toBeInTheDocument();
    isDown = false;
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(await screen.findByRole('link', { name: '33' })).toBeInTheDocument();
  });
});
