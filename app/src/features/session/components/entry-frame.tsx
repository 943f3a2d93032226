import type { ReactNode } from 'react';
import { Lark } from '@/components/lark';
import './session.css';
import { SweepDrawing } from './sweep-drawing';

/** The pages before the bench: words on the left, on graph paper a sweep that becomes the lark. */
export function EntryFrame({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="bl-entry">
      <title>{`${title} · Benchlark`}</title>
      <main className="bl-entry-words" id="main" tabIndex={-1}>
        <p className="bl-entry-name">
          <Lark sizePx={40} /> Benchlark
        </p>
        <h1>{title}</h1>
        {children}
      </main>
      <SweepDrawing />
    </div>
  );
}
