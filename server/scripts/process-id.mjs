import { readFileSync } from 'node:fs'

/**
 * When the process started, in clock ticks since boot, or undefined if there is no such process or only its zombie: a dead process
 * whose parent has not asked for it keeps its number, and `process.kill(pid, 0)` takes it for alive.
 * @param {number} pid
 * @returns {string | undefined}
 */
export function startOfProcess(pid) {
  if (!Number.isInteger(pid) || pid <= 0) return undefined
  let stat
  try {
    stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
  } catch {
    return process.platform === 'linux' ? undefined : withoutProc(pid)
  }
  // The second field is the program's name in brackets and may itself hold spaces and brackets.
  const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
  return fields[0] === 'Z' || fields[0] === 'X' ? undefined : fields[19]
}

/** @param {number} pid */
function withoutProc(pid) {
  try {
    process.kill(pid, 0)
    return 'running'
  } catch {
    return undefined
  }
}

/** Names this process for as long as it lives: number and start, so that a number used again is not mistaken for it. */
export const ownName = () => `${process.pid} ${startOfProcess(process.pid)}`

/**
 * Whether the process of a name written by `ownName` is still alive.
 * @param {string} name
 */
export function isAlive(name) {
  const [pid, start] = name.trim().split(' ')
  return start !== undefined && startOfProcess(Number(pid)) === start
}
