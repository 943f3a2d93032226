import { useLayoutEffect, useRef, useState } from 'react';

/** An element's width in CSS pixels, followed as it changes; 0 until it is laid out. */
export function useWidth<Host extends HTMLElement>() {
  const ref = useRef<Host>(null);
  const [width, setWidth] = useState(0);
  useLayoutEffect(() => {
    const host = ref.current;
    if (!host) return;
    setWidth(host.clientWidth);
    const observer = new ResizeObserver(() => setWidth(host.clientWidth));
    observer.observe(host);
    return () => observer.disconnect();
  }, []);
  return { ref, width };
}
