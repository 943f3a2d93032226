import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { CaptureLine } from '@/components/captures/capture-lines';
import { MainFigure } from '@/components/captures/main-figure';
import { Sketch } from '@/components/figures/sketch';
import { Columns, MarginBlock, Page, Section } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState } from '@/components/states/states';
import type { Capture, Today } from '@/lib/api-schema';
import { unitName, whatWasMeasured } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatLongDay, formatTime, formatWait } from '@/lib/format/date';
import { formatCounted } from '@/lib/format/quantity';
import { canWriteCaptures, usePerson, useSession } from '@/lib/use-session';
import { todayQueries } from '../api/today-queries';
import './today.css';
import { WaitsForYou } from './waits-for-you';

/** Today: what waits for whom, what is under way, what came last, the day's log. */
export function TodayPage() {
  const person = usePerson();
  const { benchName } = useSession();
  const today = useQuery(todayQueries.today());
  const now = new Date();
  const firstName = person.displayName.split(' ')[0] ?? person.displayName;
  return (
    <Page>
      <PageHead
        title={formatLongDay(now)}
        titleAside={benchName}
        sub={today.data ? summary(today.data, firstName) : `Good to see you, ${firstName}.`}
      />
      {today.isPending && <LoadingState what="Looking what waits" />}
      {today.isError && (
        <FailedState
          what="Today could not be fetched."
          why={errorWords(today.error)}
          onRetry={() => void today.refetch()}
        />
      )}
      {today.data && (
        <Columns margin={<TodayMargin today={today.data} />}>
          <section aria-labelledby="waits-title">
            <h2 id="waits-title" className="bl-today-first">
              Waits for you
            </h2>
            <WaitsForYou today={today.data} canWrite={canWriteCaptures(person)} now={now} />
          </section>
          <Section title="Under way">
            <UnderWay captures={today.data.underWay.items} />
          </Section>
          <Section title="Came last">
            <CameLast captures={today.data.recent.items} now={now} />
          </Section>
        </Columns>
      )}
    </Page>
  );
}

function summary({ unsorted, failed, damaged, underWay }: Today, firstName: string): string {
  const kinds = [unsorted, failed, damaged].filter(({ count }) => count > 0).length;
  const waits =
    kinds === 0
      ? `Nothing waits for you, ${firstName}`
      : `${formatCounted(kinds, 'thing')} wait${kinds === 1 ? 's' : ''} for you, ${firstName}`;
  const running = underWay.items.length;
  return running === 0
    ? `${waits}.`
    : `${waits}. ${formatCounted(running, 'analysis', 'analyses')} under way.`;
}

function UnderWay({ captures }: { captures: readonly Capture[] }) {
  if (captures.length === 0) return <p className="bl-ink-2">Nothing is being analysed.</p>;
  return (
    <ul className="bl-under-way">
      {captures.map((capture) => (
        <li key={capture.id}>
          <div>
            <strong>{capture.fileName}</strong>
            <span className="bl-table-second">{capture.unit ? unitName(capture.unit) : 'unsorted'}</span>
          </div>
          <CaptureLine capture={capture} />
          <Link to={`/captures/${capture.id}`}>Capture {capture.number}</Link>
        </li>
      ))}
    </ul>
  );
}

function CameLast({ captures, now }: { captures: readonly Capture[]; now: Date }) {
  if (captures.length === 0) return <p className="bl-ink-2">Nothing is in the archive yet.</p>;
  return (
    <ul className="bl-came-last">
      {captures.map((capture) => {
        const { title, detail } = whatWasMeasured(capture);
        return (
          <li key={capture.id}>
            <span>
              <Link to={`/captures/${capture.id}`} className="bl-mono">
                {capture.number}
              </Link>
              <span className="bl-table-second">{formatWait(capture.uploadedAt, now)}</span>
            </span>
            <span className="bl-came-last-drawing">
              {capture.record && <Sketch channels={capture.record.sketch} />}
            </span>
            <span>
              {title}
              <span className="bl-table-second">{detail}</span>
            </span>
            <span>
              {capture.unit ? unitName(capture.unit) : <span className="bl-ink-2">unsorted</span>}
              <span className="bl-table-second">{capture.condition?.name}</span>
            </span>
            <span>{capture.record?.mainFigure && <MainFigure main={capture.record.mainFigure} />}</span>
          </li>
        );
      })}
    </ul>
  );
}

function TodayMargin({ today: { log } }: { today: Today }) {
  return (
    <>
      <MarginBlock title="The day so far">
        {log.length === 0 && <p className="bl-ink-2">Nothing has happened yet today.</p>}
        <ul className="bl-day-log">
          {log.map(({ at, text, captureId, actorName }, index) => (
            <li key={`${at}-${index}`}>
              <time dateTime={at}>{formatTime(at)}</time>
              <span>
                {actorName ? `${actorName}: ` : ''}
                {captureId ? <Link to={`/captures/${captureId}`}>{text}</Link> : text}
              </span>
            </li>
          ))}
        </ul>
      </MarginBlock>
      <MarginBlock title="Before you play anything">
        <p>
          Take loudspeakers and headphones off the output: a test tone can destroy tweeters and hearing. Start
          quiet.
        </p>
        <p className="bl-caution-next">
          Equipment can hold dangerous voltage long after it is unplugged. Leave mains circuits to qualified
          people and keep to the local codes.
        </p>
      </MarginBlock>
    </>
  );
}
