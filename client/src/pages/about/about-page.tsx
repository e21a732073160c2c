import { pageHead } from '../../../../shared/page-head.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'

/** How an enclosure is certified: what a certificate promises and what it does not. */
export function AboutPage() {
  return (
    <Page
      about={pageHead('about')}
      head={
        <>
          <h1>How it is certified</h1>
          <p className="mt-2 max-w-prose text-[1.12rem] leading-normal">
            A merestone is a stone set in the ground to mark a boundary that both neighbours have agreed on. Here a research group agrees on the boundaries of numbers.
          </p>
        </>
      }
      margin={
        <>
          <MarginNote title="Try it">
            <p><TextLink to={paths.verify()}>Repeat a certificate</TextLink> in this browser, <TextLink to={paths.digitCheck()}>check the digits</TextLink> of a manuscript, or <TextLink to={paths.lookUp()}>look up</TextLink> digits that you have.</p>
          </MarginNote>
          <MarginNote title="To hold it against">
            <p>The <TextLink to={paths.estimates()}>estimates</TextLink> that tail bounds use, and the <TextLink to={paths.keys()}>public keys</TextLink> that certificates are signed with.</p>
          </MarginNote>
        </>
      }
    >
      <div className="max-w-[42rem] [&_li]:mt-1.5 [&_p+p]:mt-3 [&_ul]:list-disc [&_ul]:pl-5 [&_ul+p]:mt-3">
        <Section title="Why a digit needs a certificate">
          <p>
            In explicit number theory a theorem often rests on a numerical constant: the sum of <Formula latex="1/(n \log n)" text="1/(n log n)" /> over the primes, over the
            integers with exactly <Formula latex="k" text="k" /> prime factors, over the odd ones among them, or a product over primes. Of a set of integers this sum is often
            called its Erdős sum. Such a series can converge so slowly that adding terms gives a handful of digits; the rest comes from an inequality for what was left out. A
            wrong digit, a tail bound used below the point where it holds, a rounding that went inward, and the theorem built on the constant falls.
          </p>
        </Section>
        <Section title="What stands in the register">
          <p>
            An entry is not a decimal but an <em>enclosure</em>: a closed interval with decimal ends, rounded outward, that contains the constant. Its <em>certified digits</em> are
            the decimals that every number of the interval shares when it is cut off there; the digit line ends them with the stone, and what follows it is lighter because it is
            not certified. Every claim keeps its number for good, a narrower one supersedes it, and both stay citable.
          </p>
        </Section>
        <Section title="How an enclosure comes about">
          <p>
            The engine works in interval arithmetic: every number is held between two bounds, and every rounding goes outward. Where infinitely many terms or an integral have to
            be cut, what was left out is bounded by a theorem, and the bound widens the interval. The <em>error budget</em> says how much of the radius each source brings
            (discretisation, truncation below and above, tail, rounding) and by which bound. Where a bound uses a published inequality, the certificate names it, its range,
            the point where it was used, and whether it is conditional on something unproved. No hardware floating-point number decides a digit.
          </p>
          <p>
            There are two arithmetics that share no line of number code: <code>ball</code>, the engine’s own on whole numbers, and <code>mpfr</code>, which rounds with the MPFR
            library. A run by the one is rechecked by the other, or by another method; the two enclosures have to meet.
          </p>
        </Section>
        <Section title="Who agrees to it">
          <p>
            A researcher states the constant, has it enclosed, and submits the claim with its evidence. Referees repeat the computation by other arithmetic or another method, hold
            printed digits against it, check that each estimate was used inside its range, and object or confirm. A lead signs. Nobody referees or signs their own claim, and a
            referee of a claim can’t sign it. Every change is one entry of a trail in which each entry carries the hash of the one before.
          </p>
        </Section>
        <Section title="What a certificate promises">
          <ul>
            <li>The definition is exact: the same definition is the same constant, however it was typed.</li>
            <li>The enclosure follows from the definition, the method and the parameters in the file, and the same file gives the same enclosure to the last digit on every machine.</li>
            <li>Every part of the radius names the bound that it comes from, and every estimate its source and range.</li>
            <li>The digest shows a change of a single character; the signature shows that this register signed it.</li>
            <li>Anybody can repeat it: from the file alone, from the command line or <TextLink to={paths.verify()}>in their own browser</TextLink>.</li>
          </ul>
        </Section>
        <Section title="What it does not promise">
          <ul>
            <li>An enclosure is as sound as the estimates that it cites. If one of them is wrong, or was read wrongly, what rests on it falls; then it is suspended, and those it touches are told.</li>
            <li>It is as sound as the programs that computed it. Two arithmetics and two methods that agree make a fault unlikely; they prove nothing.</li>
            <li>A conditional estimate gives a conditional enclosure. The claim says so wherever it is shown.</li>
            <li>The digest and the signature speak of the file and not of the mathematics.</li>
            <li>Digits after the stone are not certified, and an enclosure that does not decide a digit does not suggest one.</li>
          </ul>
          <p>Whoever builds a proof on a constant should repeat it from its certificate, and read the bounds.</p>
        </Section>
      </div>
    </Page>
  )
}
