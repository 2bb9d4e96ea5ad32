import { createContext, useCallback, useContext, useEffect, useRef, useState, type ReactNode } from 'react';
import { deviceMs } from '../lib/clock.ts';

/** At most one polite announcement in this time; the newest wins, so a busy board says one sentence, not fifty. */
const QUIET_MS = 5000;

type Announce = (text: string, options?: { urgent?: boolean }) => void;
const AnnounceContext = createContext<Announce>(() => undefined);

/** The two live regions of the page; they are there before anything is said, or nothing would be read. */
export function Announcer({ children }: { children: ReactNode }) {
  const [polite, setPolite] = useState('');
  const [urgent, setUrgent] = useState('');
  const last = useRef(0);
  const waiting = useRef<{ text: string; timer: ReturnType<typeof setTimeout> } | null>(null);

  useEffect(() => () => clearTimeout(waiting.current?.timer), []);

  const announce = useCallback<Announce>((text, options) => {
    if (options?.urgent === true) {
      setUrgent(text);
      return;
    }
    if (waiting.current !== null) {
      waiting.current.text = text;
      return;
    }
    const say = (words: string) => {
      last.current = deviceMs();
      waiting.current = null;
      setPolite(words);
    };
    const wait = last.current + QUIET_MS - deviceMs();
    if (wait <= 0) {
      say(text);
      return;
    }
    const timer = setTimeout(() => say(waiting.current?.text ?? text), wait);
    waiting.current = { text, timer };
  }, []);

  return (
    <AnnounceContext value={announce}>
      {children}
      <div className="k-hidden" aria-live="polite" data-testid="polite">
        {polite}
      </div>
      <div className="k-hidden" aria-live="assertive" data-testid="urgent">
        {urgent}
      </div>
    </AnnounceContext>
  );
}

/** Say something to people who do not see it arrive. `urgent` only for "closing" and "you were outbid". */
export function useAnnounce(): Announce {
  return useContext(AnnounceContext);
}
