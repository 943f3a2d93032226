import './figures.css';

const WIDTH = 132;
const HEIGHT = 30;

function toPath(shares: readonly number[]): string {
  const step = WIDTH / Math.max(1, shares.length - 1);
  return shares
    .map(
      (share, index) =>
        `${index === 0 ? 'M' : 'L'}${(index * step).toFixed(1)} ${(HEIGHT - 1 - share * (HEIGHT - 3)).toFixed(1)}`,
    )
    .join('');
}

/** A small drawing of a record's main trace, so that rows are told apart by sight. One list of 0 to 1 per channel. */
export function Sketch({ channels }: { channels: readonly (readonly number[])[] }) {
  return (
    <svg
      className="bl-sketch"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
    >
      {[0.25, 0.5, 0.75].map((share) => (
        <path key={share} className="bl-sketch-grid" d={`M${WIDTH * share} 0V${HEIGHT}`} />
      ))}
      <path className="bl-sketch-base" d={`M0 ${HEIGHT - 0.5}H${WIDTH}`} />
      {channels
        .slice(0, 2)
        .map((shares, index) => <path key={index} className={`bl-sketch-${index + 1}`} d={toPath(shares)} />)
        .reverse()}
    </svg>
  );
}
