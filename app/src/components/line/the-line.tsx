import type { CSSProperties, ReactNode } from 'react';
import './the-line.css';

/** What stands at a station: done, something done to the signal, here, not yet, broken. */
export type StationNode = 'done' | 'box' | 'here' | 'not-yet' | 'broken';
/** What leads on from a station. The first three are live; the rest are evidence. */
export type StationLink = 'sound' | 'silent' | 'clipping' | 'checked' | 'unchecked' | 'share' | 'cut';

export interface Station {
  /** Above the track; left out on a compact line. */
  name: string;
  /** Below it: what is there. */
  what: ReactNode;
  /** One line of detail. */
  more?: ReactNode;
  node?: StationNode;
  /** Defaults to checked, or unchecked before a station not yet reached; the last has none. */
  link?: StationLink;
  /** 0 to 1, how much of a `share` link is drawn. */
  share?: number;
  /** Width against the others; the last is usually 0.6 to 0.8. */
  grow?: number;
  tone?: 'plain' | 'fault' | 'waiting';
}

export interface TheLineProps {
  /** What the line tells, for those who hear the page. */
  label: string;
  stations: readonly Station[];
  /** 13 px, no names: uploads and jobs. */
  isCompact?: boolean;
  /** Downwards, as beside a quote. */
  isUpright?: boolean;
  /** What is true now in a sentence; shown on phones, where details are hidden. */
  now?: ReactNode;
}

const NODE_WORDS: Record<StationNode, string> = {
  done: 'done',
  box: 'done',
  here: 'here now',
  'not-yet': 'not yet',
  broken: 'broken here',
};

function linkOf(station: Station, next: Station | undefined): StationLink | null {
  if (!next) return null;
  return station.link ?? (next.node === 'not-yet' ? 'unchecked' : 'checked');
}

/** The line: where the signal, or the evidence, is. */
export function TheLine({ label, stations, isCompact = false, isUpright = false, now }: TheLineProps) {
  const columns = stations.map(({ grow = 1 }) => `minmax(0, ${grow}fr)`).join(' ');
  const classes = ['bl-line', isCompact && 'bl-line-compact', isUpright && 'bl-line-upright'];
  return (
    <>
      <ol
        className={classes.filter(Boolean).join(' ')}
        aria-label={label}
        style={isUpright ? undefined : { gridTemplateColumns: columns }}
      >
        {stations.map((station, index) => (
          <StationItem
            key={station.name}
            station={station}
            link={linkOf(station, stations[index + 1])}
            isCompact={isCompact}
          />
        ))}
      </ol>
      {now && <p className="bl-line-now">{now}</p>}
    </>
  );
}

function StationItem({
  station,
  link,
  isCompact,
}: {
  station: Station;
  link: StationLink | null;
  isCompact: boolean;
}) {
  const { name, what, more, node = 'done', share = 0, tone = 'plain' } = station;
  const shareStyle = { '--bl-share': `${Math.round(share * 100)}%` } as CSSProperties;
  return (
    <li
      className={`bl-station bl-station-${node} bl-station-tone-${tone}`}
      aria-current={node === 'here' ? 'step' : undefined}
    >
      <span className={isCompact ? 'bl-hidden' : 'bl-station-name'}>{name}</span>
      <span className="bl-station-track">
        <span className="bl-station-node" />
        {link && (
          <span
            className={`bl-station-link bl-station-link-${link}`}
            style={link === 'share' ? shareStyle : undefined}
          />
        )}
      </span>
      <span className="bl-hidden">{NODE_WORDS[node]}: </span>
      <span className="bl-station-what">{what}</span>
      {more && <span className="bl-station-more">{more}</span>}
    </li>
  );
}
