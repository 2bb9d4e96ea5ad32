import { useCallback, useEffect, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { FieldSpecs, RawValue, RawValues } from '../calculator.ts';
import { initialValues, isInAddress, readAddress, writeAddress } from '../inputs.ts';

/** The address follows typing after this pause: one entry of history, not one a keystroke. */
const SETTLE_MS = 200;

export interface Inputs {
  readonly raw: RawValues;
  readonly set: (field: string, value: RawValue) => void;
  readonly reset: () => void;
  /** Whether anything was typed here or came with the address. */
  readonly isChanged: boolean;
  /** The whole address with what is typed right now, for sending. */
  readonly address: () => string;
}

/**
 * What is typed in a calculator, kept in the address: a reload, the back button and a person the address was sent to
 * find the same numbers.
 */
export function useInputsInAddress(fields: FieldSpecs): Inputs {
  const [search, setSearch] = useSearchParams();
  const [raw, setRaw] = useState(() => readAddress(fields, search));
  const [isChanged, setChanged] = useState(() => isInAddress(fields, search));
  const [seen, setSeen] = useState(search.toString());
  const [written, setWritten] = useState(seen);

  // An address that came from elsewhere (back, a link to another result) replaces what is typed; our own does not,
  // for by the time it is here more may have been typed.
  if (search.toString() !== seen) {
    setSeen(search.toString());
    if (search.toString() !== written) {
      setWritten(search.toString());
      setRaw(readAddress(fields, search));
      setChanged(isInAddress(fields, search));
    }
  }

  useEffect(() => {
    const next = isChanged ? writeAddress(fields, raw, search) : without(search, Object.keys(fields));
    // An address that says the same in fewer words stays as it was sent.
    const now = isChanged ? writeAddress(fields, readAddress(fields, search), search) : search;
    if (next.toString() === now.toString()) return undefined;
    const timer = setTimeout(() => {
      setWritten(next.toString());
      setSearch(next, { replace: true, preventScrollReset: true });
    }, SETTLE_MS);
    return () => clearTimeout(timer);
  }, [fields, raw, isChanged, search, setSearch]);

  const set = useCallback((field: string, value: RawValue) => {
    setChanged(true);
    setRaw((before) => ({ ...before, [field]: value }));
  }, []);

  return {
    raw,
    isChanged,
    set,
    reset: () => {
      setChanged(false);
      setRaw(initialValues(fields));
    },
    address: () => {
      const { origin, pathname } = window.location;
      return `${origin}${pathname}?${writeAddress(fields, raw, search).toString()}`;
    },
  };
}

function without(search: URLSearchParams, names: readonly string[]): URLSearchParams {
  const rest = new URLSearchParams(search);
  for (const name of names) rest.delete(name);
  return rest;
}
