/** First stop of the Tab key: past the masthead to the page's subject. */
export function SkipLink() {
  return (
    <a href="#main" className="sr-only bg-paper px-4 py-2 text-ink focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-30">
      To the main matter
    </a>
  )
}
