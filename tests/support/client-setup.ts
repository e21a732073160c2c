import '@testing-library/jest-dom/vitest'
import { cleanup } from '@testing-library/react'
import { afterEach, vi } from 'vitest'

afterEach(cleanup)

/** jsdom lays nothing out: charts get a fixed size, dialogs and scrolling the least that the components call. */
class FixedSizeObserver implements ResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}
vi.stubGlobal('ResizeObserver', FixedSizeObserver)

HTMLDialogElement.prototype.showModal ??= function showModal(this: HTMLDialogElement): void {
  this.setAttribute('open', '')
}
HTMLDialogElement.prototype.close ??= function close(this: HTMLDialogElement): void {
  this.removeAttribute('open')
  this.dispatchEvent(new Event('close'))
}
Element.prototype.scrollIntoView ??= function scrollIntoView(): void {}
