import type { FormEvent } from 'react'
import { pageHead } from '../../../../shared/page-head.ts'
import type { PrintedAs } from '../../../../shared/digit-check.ts'
import { paths } from '../../app/paths.ts'
import { DigitLine } from '../../components/digit-line/digit-line.tsx'
import { Formula } from '../../components/formula/formula.tsx'
import { Button } from '../../components/ui/button.tsx'
import { Empty } from '../../components/ui/feedback.tsx'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Choice, Field, FieldSet, TextArea } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { Table } from '../../components/ui/table.tsx'
import { compatibilityWords } from '../../features/look-up/compatibility.ts'
import type { LookUpItem } from '../../features/look-up/queries.ts'

interface LookUpViewProps {
  digits: string
  reading: PrintedAs
  /** Null while nothing is looked up. */
  found: Fetched<LookUpItem[]> | null
  /** Why the digits can't be read. */
  unreadable: string | null
  busy: boolean
  onLookUp: (digits: string, reading: PrintedAs) => void
}

/** Which constant may these digits be? */
export function LookUpView({ digits, reading, found, unreadable, busy, onLookUp }: LookUpViewProps) {
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const data = new FormData(event.currentTarget)
    onLookUp(String(data.get('digits') ?? ''), data.get('reading') === 'rounded' ? 'rounded' : 'truncated')
  }
  return (
    <Page
      about={pageHead('lookUp')}
      head={<h1>Look up digits</h1>}
      margin={
        <MarginNote title="What is compared">
          <p>The best signed enclosure of each constant that is open to you. Constants that the digits can stand for come first, the narrowest in front; then the nearest of those that are ruled out.</p>
        </MarginNote>
      }
    >
      <form key={`${digits} ${reading}`} role="search" onSubmit={submit} className="grid max-w-xl gap-4">
        <Field label="Leading digits" hint="As many as you have: 1.6366, or a whole line of a table." error={unreadable}>
          {(control) => <TextArea {...control} name="digits" defaultValue={digits} rows={1} spellCheck={false} autoComplete="off" className="min-h-11 break-all" />}
        </Field>
        <FieldSet legend="They are" className="sm:grid-cols-[auto_auto_1fr] sm:gap-x-8">
          <Choice type="radio" name="reading" value="truncated" defaultChecked={reading === 'truncated'} label="truncated" />
          <Choice type="radio" name="reading" value="rounded" defaultChecked={reading === 'rounded'} label="rounded" />
        </FieldSet>
        <div>
          <Button type="submit" tone="act" busy={busy && 'Looking up …'}>
            Look up
          </Button>
        </div>
      </form>
      {found && (
        <Section title="Constants" className="mt-9">
          <Part of={found} what="the constants">{(items) => <Found items={items} digits={digits} reading={reading} busy={busy} />}</Part>
        </Section>
      )}
    </Page>
  )
}

function Found({ items, digits, reading, busy }: { items: LookUpItem[]; digits: string; reading: PrintedAs; busy: boolean }) {
  if (items.length === 0)
    return (
      <Empty title="No constant of the register is near these digits.">
        <p>Only constants with a signed enclosure are compared. Try fewer digits, or search the <TextLink to={paths.register()}>register</TextLink> by its definition.</p>
      </Empty>
    )
  return (
    <Table
      caption="Constants beside these digits, nearest first"
      rows={items}
      rowKey={({ constant }) => constant.number}
      busy={busy}
      columns={[
        { key: 'number', header: 'Number', plain: true, cell: ({ constant }) => <TextLink to={paths.constant(constant.number)}>{constant.number}</TextLink> },
        { key: 'definition', header: 'Definition', plain: true, cell: ({ constant }) => <Formula latex={constant.definition.latex} text={constant.definition.text} /> },
        { key: 'best', header: 'Best enclosure', plain: true, cell: ({ constant }) => constant.best && <DigitLine lo={constant.best.lo} hi={constant.best.hi} limit={25} /> },
        {
          key: 'verdict', header: 'These digits', plain: true,
          cell: (item) => (
            <>
              <span className={item.ruledOutAt === null ? 'text-certain' : 'text-refused'}>{compatibilityWords(item)}</span>{' '}
              <TextLink to={paths.digitCheck({ against: item.constant.number, digits, reading })} aria-label={`Check the digits against ${item.constant.number}`} className="text-[0.92rem] whitespace-nowrap">
                check each
              </TextLink>
            </>
          ),
        },
      ]}
    />
  )
}
