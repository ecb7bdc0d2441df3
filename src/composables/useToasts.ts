import { readonly, ref } from 'vue';

export interface Toast {
  id: number;
  text: string;
  undo?: () => void;
}

const shownForMs = 6000;
const toasts = ref<Toast[]>([]);
let lastId = 0;
let timers = new Map<number, ReturnType<typeof setTimeout>>();

/** Notes that pass by themselves. Only for what needs no decision: an error belongs where it happened. */
export function useToasts() {
  function show(text: string, { undo }: { undo?: () => void } = {}): number {
    const id = ++lastId;
    toasts.value = [...toasts.value.slice(-2), { id, text, undo }];
    startTimer(id);
    return id;
  }

  function dismiss(id: number): void {
    toasts.value = toasts.value.filter((toast) => toast.id !== id);
    clearTimeout(timers.get(id));
    timers.delete(id);
  }

  function startTimer(id: number): void {
    timers.set(
      id,
      setTimeout(() => dismiss(id), shownForMs),
    );
  }

  /** A pointer or the focus rests on a note: none goes away meanwhile. */
  function hold(): void {
    for (const timer of timers.values()) clearTimeout(timer);
    timers = new Map();
  }

  function release(): void {
    for (const { id } of toasts.value) if (!timers.has(id)) startTimer(id);
  }

  return { toasts: readonly(toasts), show, dismiss, hold, release };
}
