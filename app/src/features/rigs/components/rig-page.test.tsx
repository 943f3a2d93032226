import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { fakeServer, json, problem } from '@/testing/fake-server';
import { makeCapture } from '@/testing/make-capture';
import { makePerson } from '@/testing/make-person';
import { makeBaseline, makeCalibration, makeRig } from '@/testing/make-rig';
import { renderPage } from '@/testing/render-page';
import { RigPage } from './rig-page';
import { RigsPage } from './rigs-page';

const NO_CAPTURES = { items: [], nextCursor: null, total: 0, totalAll: 0, totalBytes: 0 };
const answers = {
  'GET /api/rigs/g1': () => json(makeRig({ limitDbfs: -6, load: '33 ohm' })),
  'GET /api/rigs/g1/calibrations': () => json({ items: [makeCalibration()] }),
  'GET /api/rigs/g1/baselines': () => json({ items: [] }),
  'GET /api/captures': () => json(NO_CAPTURES),
};
const open = (person = makePerson()) => renderPage(<RigPage rigId="g1" />, { person });

afterEach(() => {
  vi.unstubAllGlobals();
});

describe('the page of a rig', () => {
  it('shows its facts, and what is not noted', async () => {
    fakeServer(answers);
    open();
    const facts = within(await screen.findByRole('region', { name: 'Facts' }));
    expect(facts.getByText('33 ohm')).toBeInTheDocument();
    expect(facts.getByText('\u22126.0 dBFS')).toBeInTheDocument();
    expect(facts.getAllByText('not noted')).toHaveLength(3);
    expect(await screen.findByText('valid until 2 Nov 2999')).toBeInTheDocument();
    expect(screen.queryByText(/expired calibration/)).not.toBeInTheDocument();
  });

  it('warns of a calibration that has run out', async () => {
    const stale = makeCalibration({ id: 'k2', range: 'pad on', state: 'expired', validUntil: '2026-05-04' });
    fakeServer({
      ...answers,
      'GET /api/rigs/g1/calibrations': () => json({ items: [makeCalibration(), stale] }),
    });
    open();
    expect(await screen.findByText('The input, pad on, has an expired calibration.')).toBeInTheDocument();
    expect(screen.getByRole('button', { name: 'Calibrate again' })).toBeInTheDocument();
    expect(screen.getByRole('cell', { name: 'expired on 4 May 2026' })).toBeInTheDocument();
  });

  it('shows the sum while a calibration is filled in, and sends full scale', async () => {
    const { requests } = fakeServer({
      ...answers,
      'POST /api/rigs/g1/calibrations': () => json(makeCalibration(), 201),
    });
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Add a calibration' }));
    expect(screen.getByText('The terminals are live while you measure.')).toBeInTheDocument();
    await userEvent.type(screen.getByLabelText('Meter reads (V RMS)'), '3.52');
    await userEvent.clear(screen.getByLabelText('Divider'));
    await userEvent.type(screen.getByLabelText('Divider'), '10');
    expect(screen.getByText(/with a divider of 10 is 35\.2 V at full scale/)).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Enter it for good' }));
    expect(await screen.findByText('Which range or gain?')).toBeInTheDocument();
    await userEvent.type(screen.getByLabelText('Range or gain'), 'pad off');
    await userEvent.type(screen.getByLabelText('Meter'), 'bench meter');
    await userEvent.type(screen.getByLabelText('Uncertainty (%)'), '0,5');
    await userEvent.click(screen.getByRole('button', { name: 'Enter it for good' }));
    const isSent = ({ method }: Request) => method === 'POST';
    await vi.waitFor(() => expect(requests.filter(isSent)).toHaveLength(1));
    expect(await requests.find(isSent)!.json()).toMatchObject({
      voltsRmsAtFullScale: 3.52,
      dividerRatio: 10,
      meterUncertaintyPercent: 0.5,
      loadOhm: null,
    });
  });

  it('retires a calibration once it is confirmed', async () => {
    const retire = vi.fn(() => json(makeCalibration({ state: 'retired' })));
    fakeServer({ ...answers, 'POST /api/rigs/g1/calibrations/k1/retire': retire });
    open();
    await userEvent.click(await screen.findByRole('button', { name: /^Retire the calibration of pad off/ }));
    expect(retire).not.toHaveBeenCalled();
    await userEvent.click(screen.getByRole('button', { name: 'Retire it' }));
    await vi.waitFor(() => expect(retire).toHaveBeenCalledOnce());
  });

  it('names a baseline of the rig’s captures without a unit', async () => {
    const id = '3b1f0c6e-7a52-4c1e-9d0a-0f6f2a9d1c11';
    const { requests } = fakeServer({
      ...answers,
      'GET /api/captures': () => json({ ...NO_CAPTURES, items: [makeCapture({ id })], total: 1 }),
      'GET /api/rigs/g1/baselines': () =>
        json({
          items: [
            makeBaseline({ hasNewerRecord: true }),
            makeBaseline({ id: 'b2', retiredAt: '2026-11-09T08:00:00.000Z' }),
          ],
        }),
      'POST /api/rigs/g1/baselines': () =>
        problem(400, {
          title: 'No',
          code: 'VALIDATION_FAILED',
          fields: { captureId: ['is a recording of a unit'] },
        }),
    });
    open();
    expect(await screen.findByText('in use; the capture was analysed again since')).toBeInTheDocument();
    expect(screen.getByText('retired on 9 Nov 2026')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Name a baseline' }));
    await screen.findByRole('option', { name: /^31, / });
    await userEvent.selectOptions(screen.getByLabelText('Capture'), id);
    await userEvent.type(screen.getByLabelText('Range or gain of the input'), 'pad off');
    await userEvent.click(screen.getByRole('button', { name: 'Name it' }));
    expect(await screen.findByText('is a recording of a unit')).toBeInTheDocument();
    const asked = requests.map(({ url }) => new URL(url).searchParams);
    expect(asked.some((query) => query.get('rigId') === 'g1' && query.get('unsorted') === 'true')).toBe(true);
  });

  it('lets an administrator look and nothing more', async () => {
    fakeServer(answers);
    open(makePerson({ roles: ['administrator'] }));
    await screen.findByText('valid until 2 Nov 2999');
    for (const name of [/^Add/, /^Change/, /^Retire/, /^Name/]) {
      expect(screen.queryByRole('button', { name })).not.toBeInTheDocument();
    }
  });

  it('says that it could not be fetched', async () => {
    fakeServer({});
    open();
    expect(await screen.findByText('The rig could not be fetched.')).toBeInTheDocument();
  });
});

describe('the list of rigs', () => {
  const list = () => renderPage(<RigsPage />, { person: makePerson() });

  it('says what each calibration is worth', async () => {
    const expired = makeRig({
      id: 'g2',
      name: 'Field',
      calibrationState: 'expired',
      calibratedUntil: '2026-05-04',
    });
    fakeServer({ 'GET /api/rigs': () => json({ items: [makeRig(), expired] }) });
    list();
    expect(await screen.findByRole('cell', { name: 'expired on 4 May 2026' })).toBeInTheDocument();
    expect(screen.getByRole('cell', { name: 'not calibrated' })).toBeInTheDocument();
    expect(screen.getByRole('link', { name: 'Field' })).toHaveAttribute('href', '/rigs/g2');
  });

  it('puts a rig on the books, with a limit and without one', async () => {
    const { requests } = fakeServer({
      'GET /api/rigs': () => json({ items: [] }),
      'POST /api/rigs': () =>
        problem(409, { title: 'Exists', code: 'CONFLICT', fields: { name: ['is taken'] } }),
    });
    list();
    expect(await screen.findByText('No rig is on the books yet.')).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Add a rig' }));
    await userEvent.type(screen.getByLabelText('Name'), 'Attic');
    const limit = screen.getByLabelText('Plays at most (dBFS)');
    await userEvent.type(limit, '3');
    await userEvent.click(screen.getByRole('button', { name: 'Put it on the books' }));
    expect(await screen.findByText(/A level from/)).toBeInTheDocument();
    await userEvent.clear(limit);
    await userEvent.type(limit, '-6');
    await userEvent.click(screen.getByRole('button', { name: 'Put it on the books' }));
    expect(await screen.findByText('is taken')).toBeInTheDocument();
    expect(await requests.find(({ method }) => method === 'POST')!.json()).toMatchObject({
      name: 'Attic',
      limitDbfs: -6,
    });
  });
});
