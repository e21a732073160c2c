import { lazy, Suspense } from 'react'
import { fitsOneLine } from '../../../../shared/printed-text.ts'

const Typeset = lazy(() => import('./typeset.tsx'))

interface FormulaProps {
  latex: string
  /** The same in plain text: shown until KaTeX has come, and to whatever can't read MathML. */
  text: string
  display?: boolean
}

/** A formula typeset by KaTeX, which is fetched with its fonts when the first formula is shown. */
export function Formula({ latex, text, display = false }: FormulaProps) {
  const plain = <span className={display ? 'block py-2 italic' : 'italic'}>{text}</span>
  if (!fitsOneLine(latex)) return plain
  return (
    <Suspense fallback={plain}>
      <Typeset latex={latex} display={display} />
    </Suspense>
  )
}
