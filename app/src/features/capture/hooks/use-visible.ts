import { useEffect, useRef, useState } from 'react';

/** Whether an element has come into view once; true at once where nothing can tell. */
export function useVisible<Host extends HTMLElement>() {
  const ref = useRef<Host>(null);
  const [isVisible, setIsVisible] = useState(typeof IntersectionObserver === 'undefined');
  useEffect(() => {
    const host = ref.current;
    if (!host || isVisible) return;
    const observer = new IntersectionObserver(([entry]) => {
      if (entry?.isIntersecting) setIsVisible(true);
    });
    observer.observe(host);
    return () => observer.disconnect();
  }, [isVisible]);
  return { ref, isVisible };
}
