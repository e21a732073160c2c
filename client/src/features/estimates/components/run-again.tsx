import { useState } from 'react'
import type { EstimateDoubt } from '../../../../../shared/schemas/estimate.ts'
import { paths } from '../../../app/paths.ts'
import { Button } from '../../../components/ui/button.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { goalText } from '../../../../../shared/engine/methods/goal.ts'
import { problemOf } from '../../../lib/errors.ts'

type Again = EstimateDoubt['again'][number]

const RUN_WORDS: Record<NonNullable<Again['run']>['state'], string> = { queued: 'waits', running: 'at work', done: 'done', failed: 'failed', stopped: 'stopped' }
/** A run that has come to nothing may be started once more. */
const isOpen = ({ run }: Again): boolean => run === null || run.state === 'failed' || run.state === 'stopped'

interface RunAgainProps {
  again: Again[]
  onStart: (again: Again) => Promise<unknown>
}

/** The constants with an enclosure on the estimate: what stands without the estimate, and a run without it by whatever method is quickest. */
export function RunAgain({ again, onStart }: RunAgainProps) {
  const [starting, setStarting] = useState<string | null>(null)
  const [refused, setRefused] = useState<{ constant: string; detail: string } | null>(null)
  const open = again.filter(isOpen)
  // One after the other, and no further than the server takes them.
  const start = async (these: Again[]) => {
    setRefused(null)
    for (const each of these) {
      setStarting(each.constant)
      try {
        await onStart(each)
      } catch (error) {
        const { detail, fields } = problemOf(error)
        setRefused({ constant: each.constant, detail: fields.map(({ message }) => message).join(' ') || detail })
        break
      }
    }
    setStarting(null)
  }
  return (
    <>
      <Table
        caption="Constants to run again without the estimate"
        rows={again}
        rowKey={({ constant }) => constant}
        columns={[
          { key: 'constant', header: 'Constant', plain: true, className: 'md:whitespace-nowrap', cell: ({ constant }) => <TextLink to={paths.constant(constant)}>{constant}</TextLink> },
          { key: 'text', header: 'Definition', plain: true, cell: ({ definition }) => definition.text },
          {
            key: 'other',
            header: 'In force without it',
            className: 'lg:whitespace-nowrap',
            cell: ({ other }) =>
              other ? (
                <>
                  <TextLink to={paths.claim(other.claimNumber)}>{other.claimNumber}</TextLink>, {other.digits === 1 ? '1 digit' : `${other.digits} digits`}
                </>
              ) : (
                'nothing'
              ),
          },
          { key: 'goal', header: 'Goal', className: 'lg:whitespace-nowrap', cell: ({ goal }) => goalText(goal) },
          {
            key: 'run',
            header: 'Run without it',
            className: 'md:whitespace-nowrap',
            cell: (each) => (
              <span className="inline-flex flex-wrap items-baseline gap-x-3">
                {each.run && <TextLink to={paths.run(each.run.id)}>{RUN_WORDS[each.run.state]}</TextLink>}
                {isOpen(each) && (
                  <Button tone="quiet" disabled={starting !== null} busy={starting === each.constant && 'Starting …'} onClick={() => void start([each])}>
                    Run again
                  </Button>
                )}
              </span>
            ),
          },
        ]}
      />
      {refused && (
        <Notice tone="refused" title={`No run of ${refused.constant} was started.`} className="mt-4" live>
          {refused.detail}
        </Notice>
      )}
      {open.length > 1 && (
        <div className="mt-4">
          <Button tone="act" busy={starting !== null && `Starting ${starting} …`} onClick={() => void start(open)}>
            Run all {open.length} again without it
          </Button>
        </div>
      )}
    </>
  )
}
