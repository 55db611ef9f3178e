/** What lies over the picture as page elements: labels of what is lit, and the middle mark for the keyboard. */
import type { Vec3 } from '../geometry/vec3'

const labelStyle =
  'position:absolute;left:0;top:0;padding:1px 6px;border-radius:4px;font-size:14px;line-height:1.3;pointer-events:none;' +
  'white-space:nowrap;color:#1f2328;background:#fffffff0;border:1px solid #1f232866;font-variant-numeric:tabular-nums;' +
  'will-change:transform'
const markStyle =
  'position:absolute;left:50%;top:50%;width:18px;height:18px;margin:-9px 0 0 -9px;border-radius:50%;pointer-events:none;' +
  'border:2px solid #1f2328;box-shadow:0 0 0 1px #fff, inset 0 0 0 1px #fff;box-sizing:border-box'

export class Overlay {
  private readonly labels: HTMLElement[] = []
  private readonly mark: HTMLElement | null

  constructor(
    private readonly element: HTMLElement,
    interactive: boolean,
  ) {
    this.mark = interactive ? this.add(markStyle) : null
    if (this.mark) this.mark.hidden = true
  }

  private add(style: string): HTMLElement {
    const node = document.createElement('div')
    node.style.cssText = style
    node.setAttribute('aria-hidden', 'true')
    this.element.append(node)
    return node
  }

  /** Sets the labels beside their places and shows the middle mark while the keyboard has the view. */
  place(labels: readonly { text: string; at: Vec3 }[], project: (at: Vec3) => { x: number; y: number }): void {
    if (this.mark) this.mark.hidden = !this.element.matches(':focus-visible')
    while (this.labels.length > labels.length) this.labels.pop()!.remove()
    while (this.labels.length < labels.length) this.labels.push(this.add(labelStyle))
    labels.forEach(({ text, at }, i) => {
      const node = this.labels[i]!
      if (node.textContent !== text) node.textContent = text
      const { x, y } = project(at)
      node.style.transform = `translate(${Math.round(x)}px, ${Math.round(y)}px) translate(-50%, -50%)`
    })
  }
}
