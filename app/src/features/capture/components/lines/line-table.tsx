import type { ReactNode } from 'react';

interface LineTableProps {
  label: string;
  heads: readonly { text: string; isNumber?: boolean }[];
  children: ReactNode;
}

/** A table of lines of a spectrum that scrolls sideways by itself where there is no room. */
export function LineTable({ label, heads, children }: LineTableProps) {
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label={label}>
      <table className="bl-table">
        <thead>
          <tr>
            {heads.map(({ text, isNumber }) => (
              <th key={text} scope="col" className={isNumber ? 'bl-table-number' : undefined}>
                {text}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>{children}</tbody>
      </table>
    </div>
  );
}
