import { sovLineState, type SovFacts } from './sov-state.ts';

const facts = (change: Partial<SovFacts> = {}): SovFacts => ({
  setAside: new Set(),
  underWay: new Set(),
  released: new Set(),
  completions: new Map(),
  ...change,
});
const line = new Set(['line']);

describe('where a line of the schedule of values stands', () => {
  it('goes from nothing over money under way to money set aside', () => {
    expect(sovLineState('line', facts())).toBe('not_set_aside');
    expect(sovLineState('line', facts({ underWay: line }))).toBe('setting_aside');
    expect(sovLineState('line', facts({ underWay: line, setAside: line }))).toBe('set_aside');
  });

  it('shows the completion before the money, and the release before both', () => {
    const submitted = facts({ setAside: line, completions: new Map([['line', 'submitted']]) });
    expect(sovLineState('line', submitted)).toBe('submitted');
    const accepted = facts({ setAside: line, completions: new Map([['line', 'accepted']]) });
    expect(sovLineState('line', accepted)).toBe('accepted');
    expect(
      sovLineState('line', facts({ released: line, completions: new Map([['line', 'released']]) })),
    ).toBe('released');
  });

  it('says nothing of other lines', () => {
    expect(sovLineState('other', facts({ setAside: line, released: line }))).toBe('not_set_aside');
  });
});
