const controller = new AbortController();

/**
 * Fires when the process is asked to stop. An answer that stays open (server-sent events) ends itself on it, so that the
 * process does not have to wait for it.
 */
export const stopping: AbortSignal = controller.signal;

/** Called once, by the process that was asked to stop. */
export function beginStopping(): void {
  controller.abort();
}
