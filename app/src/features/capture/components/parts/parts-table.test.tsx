import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { makeBody, makeChannel } from '@/testing/make-body';
import { renderPage } from '@/testing/render-page';
import type { ServedBody, ServedRecord } from '../../api/record-queries';
import { placeOfFinding } from '../../model/finding-place';
import { readPart } from '../../model/part-address';
import { productName } from '../../model/product-name';
import { FindingsBlock } from '../findings-block';
import { PartsTable } from './parts-table';

const finding = {
  code: 'mains-hum',
  severity: 'caution' as const,
  channel: 'right',
  half: null,
  fromStimulusDbfs: null,
  summary: 'Right hums at multiples of 50.0 Hz: -86.9 dBFS.',
  evidence: [{ figure: 'hum', value: -86.94075775, unit: 'dBFS' }],
  confirmBy: 'Run the player from its battery.',
};
const parts = [
  makeBody({
    channels: [
      makeChannel({
        figures: { fundamentalFrequencyHz: 997, fundamentalLevelDbfs: -1, thdPlusNoiseDb: -101.2 },
      }),
    ],
  }),
  makeBody({
    measure: 'idle',
    channels: [makeChannel(), makeChannel({ channel: 'right', figures: { humDbfs: -86.9407578 } })],
  }),
] as unknown as ServedBody[];
const record = makeBody({
  measure: 'programme',
  segments: parts as never,
  findings: [finding],
}) as unknown as ServedRecord;

describe('a programme\u2019s parts', () => {
  it('is a row each with its main figure and its state in words', () => {
    renderPage(<PartsTable parts={parts} />);
    const rows = screen.getAllByRole('row').slice(1);
    expect(rows).toHaveLength(2);
    expect(within(rows[0]!).getByText('997 Hz at \u22121.0 dBFS')).toBeInTheDocument();
    expect(within(rows[0]!).getByText('THD+N')).toBeInTheDocument();
    expect(within(rows[0]!).getByText('nothing to note')).toBeInTheDocument();
  });

  it('opens a part by its address and keeps what else was asked for', async () => {
    const { router } = renderPage(<PartsTable parts={parts} />, { address: '/?record=r7' });
    await userEvent.click(screen.getByRole('link', { name: 'idle' }));
    expect(router.state.location.search).toBe('?record=r7&segment=2');
  });

  it.each([
    ['segment=3', 3],
    ['segment=0', null],
    ['segment=x', null],
    ['', null],
  ])('reads %s as %s', (text, part) => {
    expect(readPart(new URLSearchParams(text))).toBe(part);
  });
});

describe('findings', () => {
  it('says how bad, opens to the evidence, and leads to the part that has the very figure', async () => {
    renderPage(<FindingsBlock record={record} />);
    expect(screen.getByText('caution')).toBeInTheDocument();
    await userEvent.click(screen.getByText(/Right hums/));
    expect(screen.getByText('\u221286.9')).toBeVisible();
    const link = screen.getByRole('link', { name: 'Look at part 2' });
    expect(link).toHaveAttribute('href', '/?segment=2#figure-humDbfs');
  });

  it('falls back on the measure such findings come from, else leads nowhere', () => {
    const unseen = { ...finding, evidence: [{ figure: 'hum', value: -1, unit: 'dBFS' }] };
    expect(placeOfFinding(record, unseen)).toEqual({ part: 2, figure: null });
    expect(placeOfFinding(record, { ...unseen, code: 'of a newer kind' })).toBeNull();
  });
});

describe('products of two tones', () => {
  it.each([
    [-1, 1, 'f2\u2212f1'],
    [2, -1, '2f1\u2212f2'],
    [-1, 2, '2f2\u2212f1'],
    [2, 1, 'f2+2f1'],
  ])('%d and %d is %s', (low, high, name) => {
    expect(productName(low, high)).toBe(name);
  });
});
