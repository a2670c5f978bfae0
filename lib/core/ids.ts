/** A new random id (UUID v4), the same kind in the browser, the server and the worker. */
export function newId(): string {
  return globalThis.crypto.randomUUID()
}
