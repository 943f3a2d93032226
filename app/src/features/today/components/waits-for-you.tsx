import { Button } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { SeverityMark } from '@/components/figures/severity-mark';
import type { Severity } from '@/components/figures/severity-mark';
import { NoRows } from '@/components/states/states';
import type { Capture, Today } from '@/lib/api-schema';
import { formatWait } from '@/lib/format/date';
import { formatCounted } from '@/lib/format/quantity';

interface Waiting {
  readonly key: string;
  readonly since: string | null;
  readonly severity: Severity | null;
  readonly title: string;
  readonly detail: ReactNode;
  readonly verb: string;
  readonly to: string;
}

/** Each thing that waits is a sentence with one verb. */
export function WaitsForYou({ today, canWrite, now }: { today: Today; canWrite: boolean; now: Date }) {
  const waiting = whatWaits(today, canWrite);
  if (waiting.length === 0) {
    return (
      <NoRows asked="Nothing waits for you.">
        Add a recording with the key U, or look into the archive.
      </NoRows>
    );
  }
  return (
    <ul className="bl-waits">
      {waiting.map(({ key, since, severity, title, detail, verb, to }, index) => (
        <li key={key}>
          <span className="bl-waits-since">{since ? formatWait(since, now) : ''}</span>
          <div>
            <p className="bl-waits-title">
              <Link to={to}>{title}</Link>
            </p>
            <p className="bl-waits-detail">
              {severity && <SeverityMark severity={severity} />} {detail}
            </p>
          </div>
          <Button
            asChild
            {...(index === 0
              ? {}
              : { variant: 'surface' as const, color: 'gray' as const, highContrast: true })}
          >
            <Link to={to} aria-label={`${verb}: ${title}`}>
              {verb}
            </Link>
          </Button>
        </li>
      ))}
    </ul>
  );
}

function whatWaits({ damaged, failed, unsorted }: Today, canWrite: boolean): Waiting[] {
  const waiting: Waiting[] = [];
  if (damaged.count > 0) {
    waiting.push({
      key: 'damaged',
      since: oldest(damaged.captures),
      severity: 'fault',
      title: `Look at damaged evidence: ${formatCounted(damaged.count, 'capture')}`,
      detail: `The stored bytes of ${namesOf(damaged.captures)} differ from those that were measured, or are gone. The records are safe.`,
      verb: 'Look at them',
      to: damaged.captures[0] ? `/captures/${damaged.captures[0].id}` : '/archive',
    });
  }
  if (failed.count > 0) {
    waiting.push({
      key: 'failed',
      since: oldest(failed.captures),
      severity: 'caution',
      title: `See why ${formatCounted(failed.count, 'analysis', 'analyses')} failed`,
      detail: failed.captures[0]?.failure?.message ?? namesOf(failed.captures),
      verb: 'See why',
      to:
        failed.count === 1 && failed.captures[0]
          ? `/captures/${failed.captures[0].id}`
          : '/archive?state=failed',
    });
  }
  if (canWrite && unsorted.count > 0) {
    waiting.push({
      key: 'unsorted',
      since: oldest(unsorted.captures),
      severity: null,
      title: `Name what arrived: ${formatCounted(unsorted.count, 'recording')} without a unit`,
      detail: namesOf(unsorted.captures),
      verb: unsorted.count === 1 ? 'Name it' : 'Name them',
      to: '/archive?unit=none',
    });
  }
  return waiting;
}

function oldest(captures: readonly Capture[]): string | null {
  return captures.reduce<string | null>(
    (first, { uploadedAt }) => (first === null || uploadedAt < first ? uploadedAt : first),
    null,
  );
}

function namesOf(captures: readonly Capture[]): string {
  const [first, ...others] = captures.map(({ fileName }) => fileName);
  if (first === undefined) return '';
  return others.length === 0 ? first : `${first} and ${formatCounted(others.length, 'other')}`;
}
