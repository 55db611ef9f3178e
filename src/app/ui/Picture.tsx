/** A small picture of a solid, drawn by the worker when it comes into sight, and kept until the page is closed. */
import { useEffect, useRef } from 'preact/hooks'
import { defaultColours } from '../palette'
import { useApp } from './context'

const drawn = new Map<string, Promise<ImageData | null>>()

export const Picture = ({ solid, size }: { solid: string; size: number }) => {
  const { press } = useApp()
  const ref = useRef<HTMLCanvasElement>(null)
  useEffect(() => {
    const canvas = ref.current!
    const pixels = Math.round(size * Math.min(2, devicePixelRatio || 1))
    const key = `${solid} ${pixels}`
    let gone = false
    const show = async (): Promise<void> => {
      let wait = drawn.get(key)
      if (!wait) {
        wait = press
          .picture(solid, defaultColours, pixels)
          .then((made) => (made.ok ? new ImageData(made.value.data, made.value.width, made.value.height) : null))
        drawn.set(key, wait)
      }
      const image = await wait
      if (gone || !image) return
      canvas.width = image.width
      canvas.height = image.height
      canvas.getContext('2d')?.putImageData(image, 0, 0)
      canvas.dataset.drawn = 'yes'
    }
    const watch = new IntersectionObserver(
      (entries) => {
        if (!entries.some(({ isIntersecting }) => isIntersecting)) return
        watch.disconnect()
        void show()
      },
      { rootMargin: '200px' },
    )
    watch.observe(canvas)
    return () => {
      gone = true
      watch.disconnect()
    }
  }, [solid, size])
  return (
    <span class="picture" aria-hidden="true">
      <canvas ref={ref} style={{ width: `${size}px`, height: `${size}px` }} />
    </span>
  )
}
