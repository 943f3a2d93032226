import { NO_BREAK_SPACE } from '@/lib/format/number';
import './figures.css';

/** A quantity in running text, from a formatter of lib/format: number in mono, unit in the text face, never broken. */
export function Quantity({ text }: { text: string }) {
  const parts = text.split(' ').map((part) => part.split(NO_BREAK_SPACE));
  return (
    <>
      {parts.map(([number, ...unit], index) => (
        <span key={index}>
          {index > 0 && ' '}
          <span className="bl-quantity">
            <span className="bl-mono">{number}</span>
            {unit.length > 0 && (
              <span className="bl-quantity-unit">{`${NO_BREAK_SPACE}${unit.join(NO_BREAK_SPACE)}`}</span>
            )}
          </span>
        </span>
      ))}
    </>
  );
}
