import type { ReactNode } from 'react'
import type { Run } from '../../../../../shared/schemas/run.ts'
import { goalText } from '../../../../../shared/engine/methods/goal.ts'
import { METHOD_WORDS, STATE_WORDS } from '../../../../../shared/words.ts'
import { files, paths } from '../../../app/paths.ts'
import type { MarkedState } from '../../../components/state-mark/state-mark.tsx'
import { Printed } from '../../../components/formula/printed.tsx'
import { EstimateLinks } from './estimate-links.tsx'
import { FileLink, TextLink } from '../../../components/ui/link.tsx'
import { Facts, MarginNote } from '../../../components/ui/page.tsx'
import { secondsInWords, Time } from '../../../components/ui/time.tsx'

/** How a run was asked for, its certificate, and what was made of it. */
export function RunMargin({ run }: { run: Run }) {
  return (
    <>
      <MarginNote title="As asked for">
        <Facts
          facts={[
            ['Goal', <Printed key="goal" text={goalText(run.goal)} />],
            ['Method', METHOD_WORDS[run.method]],
            ['Arithmetic', run.arithmetic],
            ...(run.without.length > 0 ? [['Without', <EstimateLinks key="without" ids={run.without} />] as [string, ReactNode]] : []),
            ['Started by', run.startedBy.name],
            ['Group', run.group.name],
            ['Asked', <Time key="asked" at={run.createdAt} precise />],
            ...(run.finishedAt ? [['Finished', <Time key="finished" at={run.finishedAt} precise />] as [string, ReactNode]] : []),
            ...(run.cpuSeconds > 0 ? [['CPU time', secondsInWords(run.cpuSeconds)] as [string, string]] : []),
            ...(run.forecastSeconds !== null ? [['Forecast', `about ${secondsInWords(run.forecastSeconds)}`] as [string, string]] : []),
          ]}
        />
      </MarginNote>
      {run.outcome && (
        <MarginNote title="Certificate">
          <p>
            <FileLink href={files.runCertificate(run.id)} download={`${run.constant}-run.json`}>
              Download the certificate
            </FileLink>
          </p>
          <p className="mt-1 text-soft">
            Anyone repeats the enclosure from this file alone. SHA-256 <code className="break-all">{run.outcome.certificateDigest}</code>
          </p>
        </MarginNote>
      )}
      {run.claims.length > 0 && (
        <MarginNote title="Claims from this run">
          <ul>
            {run.claims.map((claim) => (
              <li key={claim.id}>
                <TextLink to={paths.claim(claim)}>{claim.number ?? 'a draft'}</TextLink>, {STATE_WORDS[claim.state as MarkedState]}
              </li>
            ))}
          </ul>
        </MarginNote>
      )}
    </>
  )
}
