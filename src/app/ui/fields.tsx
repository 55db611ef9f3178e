/** Form parts of the Board: a choice, and beside it what it leads to. */
import { useSignal } from '@preact/signals'
import type { ComponentChildren } from 'preact'
import { useEffect, useId } from 'preact/hooks'
import { limits, type NumberChoice, readNumber } from '../state/choices'

export const Group = ({ title, children }: { title: string; children: ComponentChildren }) => {
  const id = useId()
  return (
    <section class="group" aria-labelledby={id}>
      <h2 id={id}>{title}</h2>
      {children}
    </section>
  )
}

interface RadiosProps<T extends string> {
  readonly legend: string
  readonly value: T
  readonly options: readonly (readonly [T, string])[]
  readonly onChange: (value: T) => void
  readonly consequence: ComponentChildren
}
export const Radios = <T extends string>({ legend, value, options, onChange, consequence }: RadiosProps<T>) => {
  const id = useId()
  return (
    <fieldset class="field" aria-describedby={`${id}-so`}>
      <legend>{legend}</legend>
      <div class="row tight">
        {options.map(([key, word]) => (
          <label key={key} class="choice">
            <input type="radio" name={id} value={key} checked={value === key} onChange={() => onChange(key)} />
            {word}
          </label>
        ))}
      </div>
      <p class="so" id={`${id}-so`}>
        {consequence}
      </p>
    </fieldset>
  )
}

interface NumberFieldProps {
  readonly name: NumberChoice
  readonly label: string
  readonly value: number
  readonly step: number
  readonly suggestions?: readonly number[]
  readonly onChange: (value: number) => void
  readonly consequence?: ComponentChildren
}
/** Takes effect on Enter, on leaving the field, and after a moment's rest. A wrong number is told and changes nothing. */
export const NumberField = ({ name, label, value, step, suggestions, onChange, consequence }: NumberFieldProps) => {
  const id = useId()
  const text = useSignal(String(value))
  const error = useSignal<string | null>(null)
  useEffect(() => {
    // Undo, or another tab: what is typed gives way only when it says something else.
    const read = readNumber(name, text.peek())
    if (!('value' in read) || read.value !== value) text.value = String(value)
    error.value = null
  }, [value])
  const commit = (): void => {
    const read = readNumber(name, text.peek())
    error.value = 'error' in read ? read.error : null
    if ('value' in read && read.value !== value) onChange(read.value)
  }
  useEffect(() => {
    const timer = setTimeout(commit, 700)
    return () => clearTimeout(timer)
  }, [text.value])
  return (
    <div class="field">
      <label for={id}>{label}</label>
      <div class="row tight">
        <input
          id={id}
          type="text"
          inputMode="decimal"
          autoComplete="off"
          class="number figures"
          value={text.value}
          aria-invalid={error.value !== null}
          aria-describedby={`${id}-so`}
          onInput={(event) => {
            text.value = event.currentTarget.value
          }}
          onBlur={commit}
          onKeyDown={(event) => {
            if (event.key === 'Enter') commit()
            const way = event.key === 'ArrowUp' ? 1 : event.key === 'ArrowDown' ? -1 : 0
            const read = readNumber(name, text.peek())
            if (way === 0 || 'error' in read) return
            event.preventDefault()
            const { least, most } = limits[name]
            text.value = String(Math.min(most, Math.max(least, read.value + way * step)))
          }}
        />
        <span class="unit">{limits[name].unit}</span>
        {suggestions?.map((each) => (
          <button
            key={each}
            type="button"
            class="chip figures"
            aria-pressed={value === each}
            aria-label={`${each} ${limits[name].unit}`}
            onClick={() => {
              text.value = String(each)
              commit()
            }}
          >
            {each}
          </button>
        ))}
      </div>
      <p class="so" id={`${id}-so`} role={error.value === null ? undefined : 'alert'}>
        {error.value === null ? consequence : <b class="error">{error.value}</b>}
      </p>
    </div>
  )
}
