/** The strip of pages; the page of the piece that is lit has a dashed frame. */
import { useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import type { PageSummary } from '../../worker'
import { useApp } from '../ui/context'
import type { Pages } from '../ui/pages'
import { counted } from '../words/figures'

const Thumb = ({
  pages,
  index,
  page,
  current,
  onGo,
}: {
  pages: Pages
  index: number
  page: PageSummary
  current: boolean
  onGo: () => void
}) => {
  const ref = useRef<HTMLButtonElement>(null)
  const url = useSignal<string | null>(null)
  const { pointed } = useApp()
  const { piece } = pointed.value
  const holds = piece !== null && page.pieces.includes(piece)
  useEffect(() => {
    const watch = new IntersectionObserver(
      (entries) => {
        if (!entries.some(({ isIntersecting }) => isIntersecting)) return
        watch.disconnect()
        void pages
          .image(index)
          .then((address) => {
            url.value = address
          })
          .catch(() => {
            // Told by `pages.error`.
          })
      },
      { rootMargin: '300px' },
    )
    watch.observe(ref.current!)
    return () => watch.disconnect()
  }, [pages])
  useEffect(() => {
    if (current) ref.current?.scrollIntoView({ block: 'nearest', inline: 'nearest' })
  }, [current])
  return (
    <li>
      <button
        ref={ref}
        type="button"
        class={`thumb ${holds ? 'holds' : ''}`}
        aria-current={current ? 'page' : undefined}
        aria-label={`Page ${index + 1}: ${page.title}${page.pieces.length > 0 ? `, ${counted(page.pieces.length, 'piece')}` : ''}`}
        onClick={onGo}
      >
        <span class="paper" style={{ aspectRatio: `${page.widthMm} / ${page.heightMm}` }}>
          {url.value && <img src={url.value} alt="" loading="lazy" />}
        </span>
        <span class="figures">{index + 1}</span>
      </button>
    </li>
  )
}

export const SheetStrip = ({ pages, index, onGo }: { pages: Pages; index: number; onGo: (page: number) => void }) => (
  <nav class="strip" aria-label="Pages">
    <ol>
      {pages.list.value.map((page, i) => (
        <Thumb
          key={page.title + String(i)}
          pages={pages}
          index={i}
          page={page}
          current={i === index}
          onGo={() => onGo(i)}
        />
      ))}
    </ol>
  </nav>
)
