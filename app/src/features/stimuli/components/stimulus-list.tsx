import { Link } from 'react-router-dom';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import { findEntry, STIMULUS_GROUPS } from '../model/stimulus-catalogue';
import { withName } from '../model/stimulus-form';

interface StimulusListProps {
  chosen: string;
  params: URLSearchParams;
}

/** Every stimulus under its question; on phones folded away behind the one chosen. */
export function StimulusList(props: StimulusListProps) {
  const isNarrow = useMedia(PHONE_QUERY);
  if (!isNarrow) return <Groups {...props} />;
  return (
    // Choosing another folds it again.
    <details className="bl-stimuli-fold" key={props.chosen}>
      <summary>{findEntry(props.chosen).title}, choose another</summary>
      <Groups {...props} />
    </details>
  );
}

function Groups({ chosen, params }: StimulusListProps) {
  return (
    <nav aria-label="Stimuli" className="bl-stimuli-list">
      {STIMULUS_GROUPS.map(({ question, entries }) => (
        <section key={question} aria-label={question}>
          <h2>{question}</h2>
          <ul>
            {entries.map(({ name, title }) => (
              <li key={name}>
                <Link
                  to={{ search: withName(params, name).toString() }}
                  aria-current={name === chosen ? 'page' : undefined}
                  replace
                >
                  {title}
                </Link>
              </li>
            ))}
          </ul>
        </section>
      ))}
    </nav>
  );
}
