import type { Role } from '../terms/people'

/** One row of a table of allowed transitions. */
export interface Transition<State extends string, Action extends string> {
  from: State
  action: Action
  to: State
  /** Who may do it; empty: it follows from another action in the same transaction and nobody can press it. */
  roles: readonly Role[]
}

/** A life cycle read from its table: drives the service, the guard and the buttons alike. */
export interface Lifecycle<State extends string, Action extends string> {
  initial: State
  transitions: readonly Transition<State, Action>[]
  /** All states, the initial one first, the others as they first appear in the table. */
  states: readonly State[]
  /** Actions that a person of this role may take in this state. */
  allowedActions: (state: State, role: Role) => Action[]
  /** State after the action; RangeError when the table does not allow it. */
  transition: (state: State, action: Action) => State
  /** No transition leaves the state. */
  isFinal: (state: State) => boolean
}

/**
 * Makes a life cycle from its table.
 *
 * @param name name for messages: "lot"
 * @param initial state in which it begins
 * @param transitions one row for each state and action
 * @returns the life cycle; its `transition` throws RangeError when the table does not allow the action in the state
 * @throws RangeError when a state and action stand in two rows, or a state cannot be reached from the initial one
 */
export function defineLifecycle<State extends string, Action extends string>(
  name: string, initial: State, transitions: readonly Transition<State, Action>[],
): Lifecycle<State, Action> {
  const states = [...new Set([initial, ...transitions.flatMap(row => [row.from, row.to])])]
  requireSoundTable(name, initial, transitions)
  const find = (state: State, action: Action) => transitions.find(row => row.from === state && row.action === action)
  return {
    initial,
    transitions,
    states,
    allowedActions: (state, role) => transitions.filter(row => row.from === state && row.roles.includes(role)).map(row => row.action),
    transition: (state, action) => {
      const row = find(state, action)
      if (row) return row.to
      const possible = transitions.filter(each => each.from === state).map(each => each.action)
      throw new RangeError(`${name}.transition: action in state ${state} must be ${possible.join(' or ') || 'none'}, got ${action}`)
    },
    isFinal: state => !transitions.some(row => row.from === state),
  }
}

function requireSoundTable(name: string, initial: string, transitions: readonly Transition<string, string>[]): void {
  const keys = transitions.map(row => `${row.from} ${row.action}`)
  const double = keys.find((key, i) => keys.indexOf(key) !== i)
  if (double) throw new RangeError(`defineLifecycle: ${name} must have one row for "${double}"`)
  const reached = new Set([initial])
  for (let before = 0; before < reached.size;) {
    before = reached.size
    for (const row of transitions) if (reached.has(row.from)) reached.add(row.to)
  }
  const lost = transitions.find(row => !reached.has(row.from))
  if (lost) throw new RangeError(`defineLifecycle: ${name} must be able to reach ${lost.from} from ${initial}`)
}
