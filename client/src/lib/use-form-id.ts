import { useCallback, useState } from 'react';
import { newId } from './ids.ts';

/**
 * The id of what a form creates, made when the form opens: it is the new row's id and the idempotency key at once,
 * so a press repeated after a lost answer creates nothing twice. `renew` after the form was sent and may be used again.
 * @param kept the id that came back with a kept draft: what may have been sent before the page was left
 */
export function useFormId(kept?: string): { id: string; renew: () => void } {
  const [id, setId] = useState(() => kept ?? newId());
  const renew = useCallback(() => setId(newId()), []);
  return { id, renew };
}
