/**
 * Declarative transition tables. Each thing with a life (scope, bid, visit, funding …) has one in its own folder;
 * the server moves a row only along it and the client offers only the moves it allows.
 */
export interface Machine<State extends string, Action extends string> {
  readonly name: string;
  readonly initial: State;
  readonly states: readonly State[];
  readonly moves: Readonly<Record<State, Readonly<Partial<Record<Action, State>>>>>;
}

/**
 * Build a machine and check it: every target is a state, every state is reachable from the initial one.
 * @throws Error when the table is wrong, so a mistake stops the program at start rather than at a customer.
 */
export function defineMachine<const State extends string, const Action extends string>(table: {
  name: string;
  initial: State;
  moves: Record<State, Partial<Record<Action, State>>>;
}): Machine<State, Action> {
  const states = Object.keys(table.moves) as State[];
  const reached = new Set<State>([table.initial]);
  const queue: State[] = [table.initial];
  for (let state = queue.pop(); state !== undefined; state = queue.pop()) {
    for (const target of Object.values(table.moves[state] ?? {}) as State[]) {
      if (!(target in table.moves)) throw new Error(`${table.name}: unknown state "${target}"`);
      if (!reached.has(target)) {
        reached.add(target);
        queue.push(target);
      }
    }
  }
  const lost = states.filter((state) => !reached.has(state));
  if (lost.length > 0) throw new Error(`${table.name}: cannot reach ${lost.join(', ')}`);
  return { name: table.name, initial: table.initial, states, moves: table.moves };
}

/** The state an action leads to, or undefined when the move is not in the table. */
export function nextState<State extends string, Action extends string>(
  machine: Machine<State, Action>,
  from: State,
  action: Action,
): State | undefined {
  return machine.moves[from][action];
}
