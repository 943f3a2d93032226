import { useState } from 'react';
import type { ChartScene } from './draw-context';
import { nearestPoint, type Readout, readAt, steppedTrace } from './readout';

export interface ChartCursor {
  readonly readout: Readout | null;
  /** The readout in words, when a key moved the cursor; a mouse would talk without end. */
  readonly spoken: string;
  readonly moveTo: (x: number | null) => void;
  readonly step: (points: number) => void;
  readonly toEnd: (end: 'first' | 'last') => void;
  /** To the next harmonic in view, or the one before. */
  readonly toHarmonic: (direction: 1 | -1) => void;
}

/** The cursor's place and what it reads there. */
export function useChartCursor(scene: ChartScene | null): ChartCursor {
  const [x, setX] = useState<number | null>(null);
  const [spoken, setSpoken] = useState('');
  const readout = scene && x !== null ? readAt(scene, x) : null;

  function speakAt(nextX: number): void {
    setX(nextX);
    setSpoken((scene && readAt(scene, nextX)?.spoken) ?? '');
  }

  function step(points: number): void {
    const stepped = scene && steppedTrace(scene);
    if (!scene || !stepped) return;
    const { view } = scene;
    const xs = [...stepped.points.x.keys()].filter((index) => {
      const at = stepped.points.x[index] ?? NaN;
      return at >= view.xMin && at <= view.xMax;
    });
    const first = xs[0] ?? 0;
    const last = xs.at(-1) ?? 0;
    const from = x === null ? Math.floor((first + last) / 2) : nearestPoint(stepped, x) + points;
    speakAt(stepped.points.x[Math.min(last, Math.max(first, from))] ?? view.xMin);
  }

  function toHarmonic(direction: 1 | -1): void {
    const marks = [...new Set((scene?.model.harmonics ?? []).map((mark) => mark.x))].sort((a, b) => a - b);
    const inView = marks.filter((mark) => scene && mark >= scene.view.xMin && mark <= scene.view.xMax);
    const ordered = direction === 1 ? inView : inView.reverse();
    const here = readout?.x ?? (direction === 1 ? -Infinity : Infinity);
    // The readout stands on a point near the mark, not quite on it.
    const next = ordered.find((mark) => direction * (mark - here) > Math.abs(mark) * 1e-3) ?? ordered[0];
    if (next !== undefined) speakAt(next);
  }

  return {
    readout,
    spoken,
    moveTo: setX,
    step,
    toEnd: (end) => scene && speakAt(end === 'first' ? scene.view.xMin : scene.view.xMax),
    toHarmonic,
  };
}
