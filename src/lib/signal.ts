/** One kind of news inside this tab: whoever subscribed hears it at once. */
export type Signal<T> = {
  emit: (value: T) => void;
  /** Returns the function that ends the subscription. */
  subscribe: (listener: (value: T) => void) => () => void;
};

export function createSignal<T>(): Signal<T> {
  const listeners = new Set<(value: T) => void>();
  return {
    emit: (value) => [...listeners].forEach((listener) => listener(value)),
    subscribe: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}
