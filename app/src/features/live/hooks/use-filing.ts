import { useState } from 'react';
import { z } from 'zod';
import type { Filing } from '../model/take';

const KEY = 'benchlark.live-filing';
const NOTHING: Filing = { unitId: null, conditionId: null, rigId: null };
const filingShape = z.object({
  unitId: z.string().nullable(),
  conditionId: z.string().nullable(),
  rigId: z.string().nullable(),
});

function readFiling(): Filing {
  try {
    const kept = filingShape.safeParse(JSON.parse(localStorage.getItem(KEY) ?? 'null'));
    return kept.success ? kept.data : NOTHING;
  } catch {
    return NOTHING; // not written by this page
  }
}

/** The unit, condition and rig on the bench, as they were left. */
export function useFiling(): [Filing, (filing: Filing) => void] {
  const [filing, setFiling] = useState(readFiling);
  return [
    filing,
    (next) => {
      localStorage.setItem(KEY, JSON.stringify(next));
      setFiling(next);
    },
  ];
}
