import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { describe, expect, test, vi } from 'vitest'
import { DigitLine, spoken } from '../../client/src/components/digit-line/digit-line.tsx'

const LO = '1.6366163233512608'
const HI = '1.6366163233512641'

describe('digit line', () => {
  test('a screen reader hears how many digits are certified and between which numbers it lies', () => {
    render(<DigitLine lo={LO} hi={HI} />)
    expect(screen.getByText('certified to 14 digits: 1.63661632335126…, between 1.6366163233512608 and 1.6366163233512641')).toBeInTheDocument()
  })
  test('groups of five, then the mark, then the upper end’s digits above the lower end’s', () => {
    const { container } = render(<DigitLine lo={LO} hi={HI} />)
    expect([...container.querySelectorAll('.digit-group')].map((group) => group.firstChild?.textContent)).toEqual(['63661', '63233', '5126'])
    expect(container.querySelectorAll('.digit-mark')).toHaveLength(1)
    expect([...(container.querySelector('.digit-following')?.children ?? [])].map((end) => end.textContent)).toEqual(['41', '08'])
  })
  test('no digit is shown as certified where there is none', () => {
    const { container } = render(<DigitLine lo="0.9991" hi="1.0002" />)
    expect(container.querySelector('.digit-lead')).toBeNull()
    expect(container.querySelector('.digit-group')?.firstChild?.nodeName.toLowerCase()).not.toBe('#text')
    expect(spoken('0.9991', '1.0002')).toBe('no certified digit, between 0.999 and 1.001')
  })
  test('an exact value has no mark', () => {
    const { container } = render(<DigitLine lo="0.99" hi="0.990" />)
    expect(container.querySelector('.digit-mark')).toBeNull()
    expect(spoken('0.99', '0.990')).toBe('exactly 0.990')
  })
  test('a long line is cut inside the certified digits, says how much is left out, and shows no mark there', () => {
    const { container } = render(<DigitLine lo={`0.${'1'.repeat(60)}2`} hi={`0.${'1'.repeat(60)}3`} limit={20} />)
    expect(container).toHaveTextContent('… 40 more')
    expect(container.querySelector('.digit-mark')).toBeNull()
  })
  test('negative numbers carry their sign', () => {
    const { container } = render(<DigitLine lo="-1.33258227" hi="-1.33258221" />)
    expect(container.querySelector('.digit-lead')).toHaveTextContent('−1.')
  })
})

describe('copying', () => {
  test('the button copies the certified digits and says so', async () => {
    const user = userEvent.setup()
    const writeText = vi.spyOn(navigator.clipboard, 'writeText')
    render(<DigitLine lo={LO} hi={HI} copy />)
    await user.click(screen.getByRole('button', { name: 'Copy certified digits' }))
    expect(writeText).toHaveBeenCalledWith('1.63661632335126')
    expect(screen.getByRole('status')).toHaveTextContent('Certified digits copied.')
  })
  test('the menu works by keyboard and gives the focus back', async () => {
    const user = userEvent.setup()
    const writeText = vi.spyOn(navigator.clipboard, 'writeText')
    render(<DigitLine lo={LO} hi={HI} copy />)
    const button = screen.getByRole('button', { name: 'Copy as …' })
    button.focus()
    await user.keyboard('{Enter}')
    expect(screen.getByRole('menuitem', { name: 'Lower end' })).toHaveFocus()
    await user.keyboard('{ArrowDown}{ArrowDown}{Enter}')
    expect(writeText).toHaveBeenCalledWith(`[${LO}, ${HI}]`)
    expect(button).toHaveFocus()
    await user.keyboard('{Enter}{Escape}')
    expect(screen.queryByRole('menu')).toBeNull()
  })
  test('where the browser forbids it, it says what to do', async () => {
    const user = userEvent.setup()
    vi.spyOn(navigator.clipboard, 'writeText').mockRejectedValue(new Error('denied'))
    render(<DigitLine lo={LO} hi={HI} copy />)
    await user.click(screen.getByRole('button', { name: 'Copy certified digits' }))
    expect(screen.getByRole('status')).toHaveTextContent('copy them by hand')
  })
})
