import { readFileSync } from 'node:fs'
import { performance } from 'node:perf_hooks'

/**
 * Milliseconds of CPU that the calling thread has used. Node counts for the whole process only, so the kernel is asked, which
 * counts a thread's nanoseconds in its schedstat; elsewhere than on Linux the clock stands in, which is right while a core is free.
 */
export function threadCpuMs(): number {
  try {
    return Number(readFileSync('/proc/thread-self/schedstat', 'latin1').split(' ', 1)[0]) / 1e6
  } catch {
    return performance.now()
  }
}
