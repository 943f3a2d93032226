import { inject } from 'vitest';
import { waitUntil } from './wait-until';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Of the one demo bench that specs share which leave it as it is, or change what no other looks at. */
    demoUrl: string;
  }
}

/** The demo bench that `shared-demo-setup.ts` has started. */
export function sharedDemo(): { readonly url: string } {
  return { url: inject('demoUrl') };
}

interface ListedCapture {
  readonly id: string;
  readonly fileName: string;
  readonly state: string;
}

/** Waits until every demo capture is analysed. */
export async function demoCaptures(getJson: (address: string) => Promise<unknown>): Promise<ListedCapture[]> {
  let captures: ListedCapture[] = [];
  await waitUntil(
    async () => {
      ({ items: captures } = (await getJson('/api/captures?limit=50')) as { items: ListedCapture[] });
      return captures.every(({ state }) => state === 'done');
    },
    { what: 'the demo captures are analysed', timeoutMs: 170_000 },
  );
  return captures;
}
