import { setFlagsFromString } from 'node:v8'

/**
 * For processes that read pictures and serve nobody meanwhile. Every leaf's pixels are megabytes outside the heap and call the
 * collector; marking the heap bit by bit beside the work then costs a third of the whole processor time. At once it costs a pause
 * of some 20 ms now and then, which nobody waits for here.
 */
export function collectAtOnce(): void {
  setFlagsFromString('--no-incremental-marking')
}
