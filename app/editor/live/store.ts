/** A value that parts of the page watch. `set` tells them at once, and only of a change. */
export interface Store<T> {
  get(): T;
  set(change: Partial<T>): void;
  /** @returns ends the watch */
  watch(onChange: () => void): () => void;
}

export function createStore<T extends object>(first: T): Store<T> {
  let value = first;
  const watchers = new Set<() => void>();
  return {
    get: () => value,
    set(change) {
      const keys = Object.keys(change) as (keyof T)[];
      if (keys.every((key) => Object.is(value[key], change[key]))) return;
      value = { ...value, ...change };
      for (const watcher of [...watchers]) watcher();
    },
    watch(onChange) {
      watchers.add(onChange);
      return () => watchers.delete(onChange);
    },
  };
}
