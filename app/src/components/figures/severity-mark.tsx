import './figures.css';

export type Severity = 'note' | 'caution' | 'fault';
const STROKES: Record<Severity, number> = { note: 1, caution: 2, fault: 3 };

/** How bad a finding is: one, two or three leaning strokes, as a reader marks a margin. */
export function SeverityMark({ severity, hasWord = false }: { severity: Severity; hasWord?: boolean }) {
  return (
    <span className={`bl-severity bl-severity-${severity}`}>
      <svg
        width="16"
        height="16"
        viewBox="0 0 16 16"
        {...(hasWord ? { 'aria-hidden': true } : { role: 'img', 'aria-label': severity })}
      >
        {Array.from({ length: STROKES[severity] }, (_, index) => (
          <path
            key={index}
            d={`M${3 + index * 4.6} 2l-1 12`}
            stroke="currentColor"
            strokeWidth="2"
            strokeLinecap="round"
          />
        ))}
      </svg>
      {hasWord && <span>{severity}</span>}
    </span>
  );
}
