import { Theme } from '@radix-ui/themes';
import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { Figure, type FigureProps } from './figure';
import { WorthKey } from './worth-mark';

const limit = { by: 'rig' as const, floor: -115, marginDb: 8, low: null, high: null, below: null };

function show(props: FigureProps) {
  return render(
    <Theme>
      <Figure {...props} />
    </Theme>,
  );
}

describe('Figure', () => {
  it('sets integer and fraction apart, so that points stand under each other', () => {
    const { container } = show({
      figureKey: 'noiseDbfs',
      value: -107.93,
      limit,
      uncertainty: { expanded: 0.5 },
    });
    expect(container.querySelector('.bl-figure-integer')).toHaveTextContent('\u2212107');
    expect(container.querySelector('.bl-figure-fraction')).toHaveTextContent('.9');
    expect(container.querySelector('.bl-figure-plus-minus')).toHaveTextContent('±0.5');
  });

  it('tells what it is worth on the mark, by tap as well', async () => {
    show({ figureKey: 'noiseDbfs', value: -107.9, limit });
    const mark = screen.getByRole('button', {
      name: /near the rig’s floor: 8\u00a0dB above what the rig alone gives/,
    });
    await userEvent.click(mark);
    expect(await screen.findByRole('tooltip')).toHaveTextContent('near the rig’s floor');
  });

  it('prints a bound with its sign and no ±', () => {
    const { container } = show({
      figureKey: 'noiseAWeightedDbfs',
      value: null,
      limit: { ...limit, below: -114.3 },
    });
    expect(screen.getByRole('img', { name: 'at most' })).toBeInTheDocument();
    expect(container.querySelector('.bl-figure-plus-minus')).toHaveTextContent('bound');
  });

  it('prints a dash and the reason for what was not measured', () => {
    const { container } = show({
      figureKey: 'snrDb',
      value: null,
      missingWhy: 'harmonics would count as noise',
    });
    expect(container.querySelector('.bl-figure-integer')).toHaveTextContent('–');
    expect(
      screen.getByRole('button', { name: 'not measured: harmonics would count as noise' }),
    ).toBeInTheDocument();
  });
});

describe('WorthKey', () => {
  it('explains the marks that are used, and no others', () => {
    render(<WorthKey worths={['near', 'clear', 'near']} />);
    expect(screen.getAllByRole('listitem').map((item) => item.textContent)).toEqual([
      ' clear of the rig',
      ' near the rig: error given',
    ]);
  });
});
