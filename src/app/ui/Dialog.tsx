import type { ComponentChildren } from 'preact'
import { useEffect, useId, useRef } from 'preact/hooks'

/** A modal window: Escape and the Close button leave it, focus returns to where it came from. */
export const Dialog = ({
  title,
  onClose,
  children,
}: {
  title: string
  onClose: () => void
  children: ComponentChildren
}) => {
  const ref = useRef<HTMLDialogElement>(null)
  const id = useId()
  useEffect(() => {
    const from = document.activeElement
    ref.current?.showModal()
    return () => {
      if (from instanceof HTMLElement) from.focus()
    }
  }, [])
  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: Escape closes a dialog by itself
    <dialog
      ref={ref}
      aria-labelledby={id}
      onClose={onClose}
      onClick={(event) => {
        // Only the backdrop is the dialog itself.
        if (event.target === ref.current) onClose()
      }}
    >
      <div class="dialog-body">
        <header>
          <h2 id={id}>{title}</h2>
          <button type="button" class="quiet" onClick={onClose}>
            Close
          </button>
        </header>
        {children}
      </div>
    </dialog>
  )
}
