import { useState } from 'react'

const DATE = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric' })
const DATE_TIME = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', hour: '2-digit', minute: '2-digit' })
const FULL = new Intl.DateTimeFormat('en-GB', { dateStyle: 'full', timeStyle: 'long' })

interface TimeProps {
  /** Instant in ISO 8601. */
  at: string
  /** With hours and minutes, where the order within a day matters. */
  precise?: boolean
}

/** A date in the reader's zone; the exact instant with its zone on hover. */
export function Time({ at, precise }: TimeProps) {
  const instant = new Date(at)
  return (
    <time dateTime={at} title={FULL.format(instant)} className="whitespace-nowrap">
      {(precise ? DATE_TIME : DATE).format(instant)}
    </time>
  )
}

const UNITS = [
  ['day', 86_400],
  ['hour', 3_600],
  ['minute', 60],
] as const

/** How long something has lasted, in its largest whole unit: "3 days", "under a minute". */
export function durationInWords(seconds: number): string {
  for (const [unit, length] of UNITS) {
    const count = Math.floor(seconds / length)
    if (count >= 1) return `${count} ${unit}${count === 1 ? '' : 's'}`
  }
  return 'under a minute'
}

/** Seconds as a person reads them while waiting: "0.4 s", "12 s", "3 min 20 s", "2 h 05 min". */
export function secondsInWords(seconds: number): string {
  if (seconds < 9.95) return `${seconds < 0.1 ? '0.1' : seconds.toFixed(1)} s`
  const whole = Math.round(seconds)
  if (whole < 60) return `${whole} s`
  if (whole < 3_600) return `${Math.floor(whole / 60)} min ${whole % 60 === 0 ? '' : `${whole % 60} s`}`.trim()
  return `${Math.floor(whole / 3_600)} h ${String(Math.floor((whole % 3_600) / 60)).padStart(2, '0')} min`
}

/** How long something has been waiting, the date on hover. */
export function Waiting({ since }: { since: string }) {
  const [now] = useState(() => Date.now())
  return (
    <time dateTime={since} title={FULL.format(new Date(since))} className="whitespace-nowrap">
      {durationInWords((now - Date.parse(since)) / 1_000)}
    </time>
  )
}
