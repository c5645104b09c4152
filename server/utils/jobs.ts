/** Background jobs, each at most once at a time; a wake-up during a run makes it run again. */
export function createJobs<Name extends string>(jobs: Record<Name, () => Promise<void>>) {
  const state = new Map<Name, 'running' | 'again'>()
  const pending = new Set<Promise<void>>()

  async function run(name: Name): Promise<void> {
    do {
      state.set(name, 'running')
      try {
        await jobs[name]()
      }
      catch (error) {
        console.error(`The job "${name}" failed and is tried again later.`, error)
      }
    } while (state.get(name) === 'again')
    state.delete(name)
  }

  return {
    wake(name: Name): void {
      if (state.has(name)) {
        state.set(name, 'again')
        return
      }
      state.set(name, 'running')
      const promise = new Promise<void>(resolve => setImmediate(resolve)).then(() => run(name)).finally(() => pending.delete(promise))
      pending.add(promise)
    },
    /** Resolves when no job runs. */
    async settled(): Promise<void> {
      while (pending.size > 0) await Promise.all(pending)
    },
  }
}
