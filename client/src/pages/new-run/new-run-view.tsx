import type { FormEvent } from 'react'
import type { UseFormReturn } from 'react-hook-form'
import { pageHead } from '../../../../shared/page-head.ts'
import { LIMITS } from '../../../../shared/limits.ts'
import type { Plan } from '../../../../shared/schemas/run.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { Button } from '../../components/ui/button.tsx'
import { Choice, Field, FieldSet, TextInput } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page, Section } from '../../components/ui/page.tsx'
import { DefinitionFields } from '../../features/runs/components/definition-fields.tsx'
import { EstimateLinks } from '../../features/runs/components/estimate-links.tsx'
import { ForecastRefusals, ForecastTable } from '../../features/runs/components/forecast-table.tsx'
import type { Choice as MethodChoice } from '../../features/runs/components/forecast-table.tsx'
import type { FieldMessages, RunFormValues } from '../../features/runs/run-form.ts'
import { problemOf } from '../../lib/errors.ts'

export interface NewRunViewProps {
  form: UseFormReturn<RunFormValues>
  errors: FieldMessages
  plan: Plan | undefined
  planning: boolean
  planError: unknown
  chosen: MethodChoice | null
  onChoose: (choice: MethodChoice) => void
  onStart: () => void
  starting: boolean
  startError: unknown
  mayStart: boolean
}

export function NewRunView({ form, errors, plan, planning, planError, chosen, onChoose, onStart, starting, startError, mayStart }: NewRunViewProps) {
  const atFields = Object.keys(errors).length > 0
  const possible = plan?.forecasts.some((forecast) => forecast.possible) ?? false
  const start = (event: FormEvent) => {
    event.preventDefault()
    onStart()
  }
  return (
    <Page about={pageHead('newRun')} head={<h1>New run</h1>}>
      <form onSubmit={start} noValidate className="grid gap-x-14 gap-y-8 wide:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
        <div className="grid content-start gap-5">
          <DefinitionFields form={form} errors={errors} />
          <GoalFields form={form} errors={errors} />
        </div>
        <div className="min-w-0">
          <div className="entry min-h-36">
            {plan ? (
              <>
                <Formula display latex={plan.definition.latex} text={plan.definition.text} />
                <p className="mt-1 text-soft">{plan.definition.text}</p>
                {plan.constant && (
                  <p className="mt-1">
                    It stands in the register as <TextLink to={paths.constant(plan.constant)}>{plan.constant}</TextLink>.
                  </p>
                )}
              </>
            ) : (
              <p className="text-soft italic">{atFields ? 'The definition stands here once the fields can be read.' : planError ? 'No definition.' : 'Reading the definition …'}</p>
            )}
          </div>
          <Section title="What can be computed" className="mt-8" beside={planning && plan ? 'forecasting …' : undefined}>
            {plan && !atFields && possible ? (
              <ForecastTable forecasts={plan.forecasts} chosen={chosen} onChoose={onChoose} busy={planning} />
            ) : plan && !atFields ? (
              <Notice tone="refused" title="No method reaches this goal." live>
                Below stands why. Ask for less, or change the definition.
              </Notice>
            ) : (
              <p className="text-soft">For each method: whether it reaches the goal, the radius, and the time on this server. Nothing is started yet.</p>
            )}
          </Section>
          {plan && !atFields && plan.without.length > 0 && (
            <p className="mt-4 max-w-prose text-[0.92rem] text-soft">
              In doubt in your group, and so left out: <EstimateLinks ids={plan.without} />.
            </p>
          )}
          {plan && !atFields && <ForecastRefusals forecasts={plan.forecasts} />}
          {planError && !atFields ? (
            <Notice tone="refused" title="This can’t be computed." live className="mt-5">
              {problemOf(planError).detail}
            </Notice>
          ) : null}
          {startError && !atFields ? (
            <Notice tone="refused" title="Not started." live className="mt-5">
              {problemOf(startError).detail}
            </Notice>
          ) : null}
          {mayStart ? (
            <div className="mt-6">
              <Button type="submit" tone="act" disabled={atFields || chosen === null} busy={starting && 'Starting …'}>
                Start the run
              </Button>
            </div>
          ) : (
            <p className="mt-6 text-soft">Runs are started by researchers. You can read here what would be computed.</p>
          )}
        </div>
      </form>
    </Page>
  )
}

function GoalFields({ form, errors }: { form: UseFormReturn<RunFormValues>; errors: FieldMessages }) {
  const { goal } = form.getValues()
  return (
    <FieldSet legend="Goal">
      <Choice type="radio" value="digits" label="certified digits after the point" {...form.register('goal')} />
      <Choice type="radio" value="width" label="an enclosure of at most this width" {...form.register('goal')} />
      <Choice type="radio" value="cutoff" label="terms up to a cut-off, with a bound of the tail" {...form.register('goal')} />
      <div className="mt-2">
        {goal === 'digits' ? (
          <Field label="Digits" hint={`From 1 to ${LIMITS.digits}`} error={errors.digits} narrow>
            {(control) => <TextInput {...control} {...form.register('digits')} inputMode="numeric" autoComplete="off" />}
          </Field>
        ) : goal === 'width' ? (
          <Field label="Width" hint={<>hi − lo at most this, such as 2.5e-30</>} error={errors.width} narrow>
            {(control) => <TextInput {...control} {...form.register('width')} autoComplete="off" spellCheck={false} />}
          </Field>
        ) : (
          <Field label="Cut-off" hint="All terms up to it are added" error={errors.cutoff} narrow>
            {(control) => <TextInput {...control} {...form.register('cutoff')} inputMode="numeric" autoComplete="off" />}
          </Field>
        )}
      </div>
    </FieldSet>
  )
}
