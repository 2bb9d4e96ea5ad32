import { useEffect, useState, type RefObject } from 'react';

/** Whether an element is on the screen of a page that is being looked at. */
export function useInView(element: RefObject<Element | null>): boolean {
  const [inside, setInside] = useState(false);
  const [visible, setVisible] = useState(() => document.visibilityState === 'visible');
  useEffect(() => {
    const observed = element.current;
    if (observed === null) return undefined;
    const observer = new IntersectionObserver((entries) =>
      setInside(entries.at(-1)?.isIntersecting ?? false),
    );
    observer.observe(observed);
    return () => observer.disconnect();
  }, [element]);
  useEffect(() => {
    const look = () => setVisible(document.visibilityState === 'visible');
    document.addEventListener('visibilitychange', look);
    return () => document.removeEventListener('visibilitychange', look);
  }, []);
  return inside && visible;
}
