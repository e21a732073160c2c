/** Both ends to the last digit, for the sheet of paper, where no menu copies them. */
export function EndsOnPaper({ lo, hi }: { lo: string; hi: string }) {
  return (
    <dl className="mt-2 hidden grid-cols-[auto_1fr] gap-x-4 text-[0.92rem] print:grid">
      <dt>Upper end</dt>
      <dd className="break-all">{hi}</dd>
      <dt>Lower end</dt>
      <dd className="break-all">{lo}</dd>
    </dl>
  )
}
