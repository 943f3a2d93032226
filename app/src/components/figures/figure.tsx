import type { FigureParts } from '@/lib/format/figure';
import { formatFigure } from '@/lib/format/figure';
import { worthOfFigure } from '@/lib/worth';
import { BoundSign } from './bound-sign';
import './figures.css';
import { WorthMark } from './worth-mark';

export interface FigureProps extends FigureParts {
  /** The record's key: decides unit, rounding and kind. */
  figureKey: string;
  /** Width of the integer column in characters, sign and bound included. */
  integerCh?: number;
  /** Width of the fraction column in characters, point included; 0 where a column has no decimals. */
  fractionCh?: number;
  /** Width kept for ±; 0 leaves it out. */
  uncertaintyCh?: number;
  size?: 'table' | 'live';
  /** Tables with a unit column leave the unit out. */
  hasUnit?: boolean;
  hasWorth?: boolean;
  /** Why nothing was measured (a warning's sentence), told on the mark. */
  missingWhy?: string | null;
}

/** A figure with its point under the others', its uncertainty and what it is worth. */
export function Figure({
  figureKey,
  value,
  limit,
  uncertainty,
  integerCh = 5,
  fractionCh = 3,
  uncertaintyCh = 5,
  size = 'table',
  hasUnit = false,
  hasWorth = true,
  missingWhy,
}: FigureProps) {
  const text = formatFigure(figureKey, { value, limit, uncertainty });
  const worth = hasWorth ? worthOfFigure(figureKey, value, limit) : null;
  const classes = ['bl-figure', size === 'live' && 'bl-figure-live', text.bound && 'bl-figure-bound'];
  return (
    <span className={classes.filter(Boolean).join(' ')}>
      <span className="bl-figure-integer" style={{ minWidth: `${integerCh}ch` }}>
        {text.bound && <BoundSign side={text.bound} />}
        {text.integer}
      </span>
      <span className="bl-figure-fraction" style={{ minWidth: `${fractionCh}ch` }}>
        {text.fraction}
      </span>
      {hasUnit && text.unit !== '' && <span className="bl-figure-unit">{text.unit}</span>}
      {uncertaintyCh > 0 && (
        <span className="bl-figure-plus-minus" style={{ minWidth: `${uncertaintyCh}ch` }}>
          {text.bound ? 'bound' : text.plusMinus}
        </span>
      )}
      {hasWorth && (
        <span className="bl-figure-worth">
          {worth && (
            <WorthMark worth={worth.worth} why={worth.worth === 'not-measured' ? missingWhy : worth.why} />
          )}
        </span>
      )}
    </span>
  );
}
