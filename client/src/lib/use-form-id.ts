import { useCallback, useState } from 'react';
import { newId } from './ids.ts';

/**
 * The id of what a form creates, made when the form opens: it is the new row's id and the idempotency key at once,
 * so a press repeated after a lost answer creates nothing twice. `renew` after the form was sent and may be used again.
 */
export function useFormId(): { id: string; renew: () => void } {
  const [id, setId] = useState(newId);
  const renew = useCallback(() => setId(newId()), []);
  return { id, renew };
}
