import type { Responsibility, ScopeDraft } from '@kerfyard/common/scopes';

/** A typed figure: a number, null when empty, the text itself while it is no number. */
type Typed = number | string | null;

/** The form's own part of a draft; the cut list is kept beside it, since 500 lines must not wait for the form. */
export interface ScopeFormValues {
  title: string;
  summary: string;
  site: {
    name: string;
    address: string;
    city: string;
    state: string;
    zip: string;
    lat: Typed;
    lon: Typed;
    timeZone: string;
    contact: string;
  };
  conditions: {
    element: string;
    face: string;
    indoors: boolean | null;
    floor: string;
    steel: string;
    postTension: string;
    below: string;
    enginesAllowed: boolean | null;
    overcutsAllowed: boolean | null;
    workHours: string;
    access: string;
  };
  responsibilities: Responsibility[];
  terms: {
    priceForm: string;
    retainageBasisPoints: Typed;
    standbyFreeMinutes: Typed;
    answerDays: Typed;
    bidValidDays: Typed;
    workFrom: string;
    workTo: string;
    wages: string;
    notes: string;
  };
  bidding: { mode: string; dueAt: string | null };
}

/** The form before anything is typed. Steel and post-tension begin as unknown: that is what they are. */
export const emptyScope: ScopeFormValues = {
  title: '',
  summary: '',
  site: {
    name: '',
    address: '',
    city: '',
    state: '',
    zip: '',
    lat: null,
    lon: null,
    timeZone: '',
    contact: '',
  },
  conditions: {
    element: '',
    face: '',
    indoors: null,
    floor: '',
    steel: 'unknown',
    postTension: 'unknown',
    below: '',
    enginesAllowed: null,
    overcutsAllowed: null,
    workHours: '',
    access: '',
  },
  responsibilities: [],
  terms: {
    priceForm: 'either',
    retainageBasisPoints: 0,
    standbyFreeMinutes: 30,
    answerDays: 7,
    bidValidDays: 30,
    workFrom: '',
    workTo: '',
    wages: 'open_shop',
    notes: '',
  },
  bidding: { mode: 'sealed', dueAt: null },
};

/** What the server keeps. An empty field is kept as null: publishing then says that it is needed. */
export function toDraft(values: ScopeFormValues, cuts: ScopeDraft['cuts']): ScopeDraft {
  return {
    title: values.title,
    summary: values.summary,
    site: blanksAsNull(values.site),
    cuts,
    conditions: blanksAsNull(values.conditions),
    responsibilities: values.responsibilities.map((row) => ({ ...row })),
    terms: blanksAsNull(values.terms),
    bidding: blanksAsNull(values.bidding),
  };
}

/** A draft back in the form; fields it does not have yet are as in an empty form. */
export function fromDraft(draft: ScopeDraft): ScopeFormValues {
  return {
    title: draft.title,
    summary: draft.summary,
    site: filled(emptyScope.site, draft.site),
    conditions: filled(emptyScope.conditions, draft.conditions),
    responsibilities: draft.responsibilities as unknown as Responsibility[],
    terms: filled(emptyScope.terms, draft.terms),
    bidding: filled(emptyScope.bidding, draft.bidding),
  };
}

type Section = ScopeDraft['site'];

function blanksAsNull(section: Section): Section {
  return Object.fromEntries(
    Object.entries(section).map(([name, value]) => [name, value === '' ? null : value]),
  );
}

function filled<Values extends Section>(empty: Values, typed: Section): Values {
  const kept = Object.entries(typed).filter(([name, value]) => name in empty && value !== null);
  return { ...empty, ...Object.fromEntries(kept) };
}
