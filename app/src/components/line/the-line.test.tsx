import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { TheLine } from './the-line';

describe('TheLine', () => {
  const stations = [
    { name: 'recording', what: '12 Nov 2026' },
    { name: 'record', what: 'record 3, current', node: 'here' as const },
    { name: 'review', what: 'draft', node: 'not-yet' as const },
  ];

  it('tells each station’s state in words, and which one is now', () => {
    render(<TheLine label="Evidence" stations={stations} />);
    const items = within(screen.getByRole('list', { name: 'Evidence' })).getAllByRole('listitem');
    expect(items.map((item) => item.textContent)).toEqual([
      'recordingdone: 12 Nov 2026',
      'recordhere now: record 3, current',
      'reviewnot yet: draft',
    ]);
    expect(items[1]).toHaveAttribute('aria-current', 'step');
  });

  it('draws a dashed link to what is not yet reached and none after the last', () => {
    const { container } = render(<TheLine label="Evidence" stations={stations} />);
    const links = [...container.querySelectorAll('.bl-station-link')].map((link) =>
      link.className.split('link-').at(-1),
    );
    expect(links).toEqual(['checked', 'unchecked']);
  });

  it('draws a link to its share', () => {
    const { container } = render(
      <TheLine
        label="Upload"
        isCompact
        stations={[
          { name: 'sent', what: '62 %', link: 'share', share: 0.62 },
          { name: 'dsp', what: '' },
        ]}
      />,
    );
    const link = container.querySelector<HTMLElement>('.bl-station-link-share');
    expect(link?.style.getPropertyValue('--bl-share')).toBe('62%');
  });
});
