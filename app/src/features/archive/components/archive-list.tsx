import { Button } from '@radix-ui/themes';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { FailedState, LoadingState, NoRows, SpokenStatus } from '@/components/states/states';
import { unitName } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatCount } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';
import { unitQueries } from '@/lib/queries/units';
import { useFilingChoices } from '@/lib/use-filing-choices';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { useArchiveView } from '../hooks/use-archive-view';
import { isNarrowed, NO_FILTER, toQuery } from '../model/archive-filter';
import './archive.css';
import { ArchiveCards } from './archive-cards';
import { ArchiveTable } from './archive-table';
import { ChosenBar } from './chosen-bar';
import { FilterSentence } from './filter-sentence';
import { WordsField } from './words-field';

const ORDER_WORDS = {
  uploadedAt: ['oldest first', 'newest first'],
  number: ['lowest number first', 'highest number first'],
  fileName: ['by file name', 'by file name, backwards'],
  sizeBytes: ['smallest first', 'largest first'],
  durationS: ['shortest first', 'longest first'],
  unit: ['by unit', 'by unit, backwards'],
  measure: ['by measure', 'by measure, backwards'],
} as const;

/** The captures: what to show as a sentence, then the rows by day. */
export function ArchiveList() {
  const { filter, chosen, changeFilter, changeChosen } = useArchiveView();
  const { units, rigs } = useFilingChoices();
  const isPhone = useMedia(PHONE_QUERY);
  const canChoose = canWriteCaptures(usePerson());
  const list = useInfiniteQuery(captureQueries.list(toQuery(filter)));
  const captures = list.data?.pages.flatMap(({ items }) => items) ?? [];
  const counts = list.data?.pages[0];
  const chosenCaptures = captures.filter(({ number }) => chosen.has(number));

  return (
    <section className="bl-archive" aria-labelledby="captures-title">
      <h2 id="captures-title" className="bl-hidden">
        Captures
      </h2>
      <div className="bl-archive-head">
        <FilterSentence filter={filter} units={units} rigs={rigs} onChange={changeFilter} />
        <WordsField words={filter.words} onChange={(words) => changeFilter({ words })} />
      </div>
      {filter.words !== '' && <UnitsFound words={filter.words} />}
      {counts && (
        <p className="bl-archive-count">
          {formatCount(counts.total)} of {formatCount(counts.totalAll)},{' '}
          {ORDER_WORDS[filter.sort][filter.order === 'asc' ? 0 : 1]}
        </p>
      )}
      <SpokenStatus>{counts ? `${counts.total} captures found` : ''}</SpokenStatus>
      {list.isPending && <LoadingState what="Fetching the captures" />}
      {list.isError && (
        <FailedState
          what="The captures could not be fetched."
          why={errorWords(list.error)}
          onRetry={() => void list.refetch()}
        />
      )}
      {counts && captures.length === 0 && (
        <NoCaptures isNarrowed={isNarrowed(filter)} onWiden={() => changeFilter(NO_FILTER)} />
      )}
      {captures.length > 0 &&
        (isPhone ? (
          <ArchiveCards captures={captures} chosen={chosen} canChoose={canChoose} onChoose={changeChosen} />
        ) : (
          <ArchiveTable
            captures={captures}
            filter={filter}
            chosen={chosen}
            canChoose={canChoose}
            onSort={(sort, order) => changeFilter({ sort, order })}
            onChoose={changeChosen}
          />
        ))}
      {list.hasNextPage && (
        <p className="bl-archive-more">
          <Button
            variant="surface"
            color="gray"
            highContrast
            disabled={list.isFetchingNextPage}
            onClick={() => void list.fetchNextPage()}
          >
            {list.isFetchingNextPage ? 'Fetching more' : 'Show more'}
          </Button>{' '}
          <span className="bl-ink-2">{formatCount(captures.length)} shown</span>
        </p>
      )}
      {canChoose && chosenCaptures.length > 0 && (
        <ChosenBar
          captures={chosenCaptures}
          units={units}
          rigs={rigs}
          onLetGo={() => changeChosen(new Set())}
        />
      )}
    </section>
  );
}

function NoCaptures({ isNarrowed: isFiltered, onWiden }: { isNarrowed: boolean; onWiden: () => void }) {
  if (!isFiltered) {
    return (
      <NoRows asked="Nothing is in the archive yet.">Drop a WAV file anywhere on this page to begin.</NoRows>
    );
  }
  return (
    <NoRows asked="No capture fits this sentence.">
      Widen it above, or{' '}
      <button type="button" className="bl-word" onClick={onWiden}>
        show all captures
      </button>
      .
    </NoRows>
  );
}

/** Find looks among the units too. */
function UnitsFound({ words }: { words: string }) {
  const { data } = useQuery(unitQueries.list(words));
  if (!data || data.items.length === 0) return null;
  return (
    <p className="bl-archive-units">
      Units that fit:{' '}
      {data.items.slice(0, 5).map((unit, index) => (
        <span key={unit.id}>
          {index > 0 && '; '}
          <Link to={`/units/${unit.id}`}>{unitName(unit)}</Link>
        </span>
      ))}
    </p>
  );
}
