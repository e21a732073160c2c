import { act, renderHook } from '@testing-library/react'
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { useRunEvents } from '../../client/src/features/runs/use-run-events.ts'

/** An event source that the test drives. */
class FakeSource {
  static CLOSED = 2
  static all: FakeSource[] = []
  readyState = 1
  onerror: (() => void) | null = null
  listeners: ((message: { data: string }) => void)[] = []
  readonly url: string
  constructor(url: string) {
    this.url = url
    FakeSource.all.push(this)
  }
  addEventListener(_name: string, listener: (message: { data: string }) => void): void {
    this.listeners.push(listener)
  }
  close(): void {
    this.readyState = 2
  }
  tell(event: unknown): void {
    act(() => this.listeners.forEach((listener) => listener({ data: JSON.stringify(event) })))
  }
  fail(readyState: number): void {
    this.readyState = readyState
    act(() => this.onerror?.())
  }
}

const event = { state: 'running', progress: 0.25, shards: { done: 1, total: 4 }, secondsLeft: 3, cpuSeconds: 1, enclosure: null }

beforeEach(() => {
  FakeSource.all = []
  vi.stubGlobal('EventSource', FakeSource)
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

describe('progress of a run', () => {
  test('is told as it comes, and its end once', () => {
    const end = vi.fn()
    const { result } = renderHook(() => useRunEvents('/events', true, end))
    FakeSource.all[0]?.tell(event)
    expect(result.current?.progress).toBe(0.25)
    FakeSource.all[0]?.tell({ ...event, state: 'done', progress: 1 })
    expect(end).toHaveBeenCalledOnce()
    expect(FakeSource.all[0]?.readyState).toBe(2)
  })
  test('a stream that the browser gave up is opened anew; one that it retries itself is left alone', () => {
    renderHook(() => useRunEvents('/events', true, () => undefined))
    FakeSource.all[0]?.fail(0)
    act(() => void vi.advanceTimersByTime(10_000))
    expect(FakeSource.all).toHaveLength(1)
    FakeSource.all[0]?.fail(2)
    act(() => void vi.advanceTimersByTime(3_000))
    expect(FakeSource.all).toHaveLength(2)
    FakeSource.all[1]?.fail(2)
    act(() => void vi.advanceTimersByTime(3_000))
    expect(FakeSource.all).toHaveLength(3)
  })
  test('nothing is opened for a run at rest, and nothing stays open after the page is left', () => {
    const { rerender, unmount } = renderHook(({ active }) => useRunEvents('/events', active, () => undefined), { initialProps: { active: false } })
    expect(FakeSource.all).toHaveLength(0)
    rerender({ active: true })
    FakeSource.all[0]?.fail(2)
    unmount()
    act(() => void vi.advanceTimersByTime(10_000))
    expect(FakeSource.all).toHaveLength(1)
  })
})
