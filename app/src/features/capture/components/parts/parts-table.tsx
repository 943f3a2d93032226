import { Link, useSearchParams } from 'react-router-dom';
import { Section } from '@/components/page/page';
import { formatDuration } from '@/lib/format/quantity';
import type { ServedBody } from '../../api/record-queries';
import { partSearch } from '../../model/part-address';
import { partState, partTitle } from '../../model/part-words';
import { PartFigures } from './part-figures';
import { PartSketch } from './part-sketch';
import './parts.css';

/** A programme's parts: a row each, told apart by a drawing, its main figures and its state in words. */
export function PartsTable({ parts }: { parts: readonly ServedBody[] }) {
  const [params] = useSearchParams();
  return (
    <Section title="What the programme holds" sub="open a part for its charts and all of its figures">
      <table className="bl-table bl-table-rows bl-parts">
        <thead>
          <tr>
            <th scope="col">part</th>
            <th scope="col">trace</th>
            <th scope="col">main figures</th>
            <th scope="col">what to know</th>
          </tr>
        </thead>
        <tbody>
          {parts.map((part, index) => {
            const { title, detail } = partTitle(part);
            return (
              <tr key={index}>
                <th scope="row">
                  <Link to={{ search: partSearch(params, index + 1) }} preventScrollReset>
                    {title}
                  </Link>
                  {detail && <span className="bl-table-second">{detail}</span>}
                  <span className="bl-table-second">
                    {formatDuration(part.settings.fromS)} to {formatDuration(part.settings.toS)}
                  </span>
                </th>
                <td className="bl-parts-trace">
                  <PartSketch body={part} />
                </td>
                <td>
                  <PartFigures body={part} />
                </td>
                <td className="bl-ink-2">{partState(part)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </Section>
  );
}
