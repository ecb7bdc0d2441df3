export type ConnectionEvent = 'session-end' | 'offline' | 'online';

const target = new EventTarget();

/** What happened to the line between this page and the server; the frame answers it in place. */
export function tellConnection(event: ConnectionEvent): void {
  target.dispatchEvent(new Event(event));
}

/** Returns the function that stops listening. */
export function onConnection(event: ConnectionEvent, listener: () => void): () => void {
  target.addEventListener(event, listener);
  return () => target.removeEventListener(event, listener);
}
