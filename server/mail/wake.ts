let listener: (() => void) | undefined;

/** Tells the sender of this process, if it runs one, that a mail was committed; other processes find it by polling. */
export function wakeSender(): void {
  listener?.();
}

export function onWake(wake: (() => void) | undefined): void {
  listener = wake;
}
