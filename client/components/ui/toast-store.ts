export type Toast = { id: number; text: string };

const SHOWN_MS = 6_000;
let toasts: Toast[] = [];
let lastId = 0;
const listeners = new Set<() => void>();

function replace(next: Toast[]) {
  toasts = next;
  for (const listener of listeners) listener();
}

/** Confirms that something was done. Never for what must be read: that stands in the page. */
export function confirmDone(text: string): void {
  lastId += 1;
  const id = lastId;
  replace([...toasts.slice(-2), { id, text }]);
  setTimeout(() => dismissToast(id), SHOWN_MS);
}

export function dismissToast(id: number): void {
  replace(toasts.filter((toast) => toast.id !== id));
}

export function currentToasts(): Toast[] {
  return toasts;
}

export function onToastsChange(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
