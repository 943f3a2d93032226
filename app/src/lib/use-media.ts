import { useCallback, useSyncExternalStore } from 'react';

export const PHONE_QUERY = '(max-width: 700px)';

/** Whether a media query holds now; follows it as the window changes. */
export function useMedia(query: string): boolean {
  const subscribe = useCallback(
    (listener: () => void) => {
      const media = matchMedia(query);
      media.addEventListener('change', listener);
      return () => media.removeEventListener('change', listener);
    },
    [query],
  );
  return useSyncExternalStore(subscribe, () => matchMedia(query).matches);
}
