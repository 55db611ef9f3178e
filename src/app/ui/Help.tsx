import { Cautions } from './Cautions'
import { useApp } from './context'
import { Dialog } from './Dialog'
import { Legend } from './Legend'
import type { Theme, ViewMode } from './prefs'

const keys: readonly [string, string][] = [
  ['1 2 3 4', 'Shelf, Board, Sheets, Bench'],
  ['Ctrl Z, Ctrl Shift Z', 'undo and redo: choices on the Board, gluing on the Bench'],
  ['arrows, + −, 0', 'turn, zoom and reset the model, when it has the focus'],
  ['Enter on the model', 'picks the panel under the middle mark'],
  ['arrows, Page Up, Page Down', 'pages, when a page has the focus'],
  ['+ −, 0', 'zoom the page; 0 shows all of it'],
  ['G', 'Bench: the piece is glued'],
]

export const Help = ({ onClose }: { onClose: () => void }) => {
  const { prefs } = useApp()
  return (
    <Dialog title="Help" onClose={onClose}>
      <section>
        <h3>The way</h3>
        <ol>
          <li>
            <b>Shelf.</b> Pick a solid: by name, number, vertex configuration or Wythoff symbol.
          </li>
          <li>
            <b>Board.</b> Say how tall, on which card, in which colours. Beside each choice stands what it leads to.
          </li>
          <li>
            <b>Sheets.</b> Look through the pages, download the PDF, print it at 100 % (actual size). Measure the bar of
            100 mm on the first sheet before you cut.
          </li>
          <li>
            <b>Bench.</b> One piece after the other: take it, fold it, glue the seams that are named. Your place is
            kept.
          </li>
        </ol>
      </section>
      <section>
        <h3>Lines on the sheets</h3>
        <Legend />
      </section>
      <section>
        <h3>Words</h3>
        <dl class="pairs">
          <dt>Panel</dt>
          <dd>a flat part of the finished model, as you see and touch it</dd>
          <dt>Piece</dt>
          <dd>panels that stay joined by folds and are cut out as one</dd>
          <dt>Seam</dt>
          <dd>two edges that are glued; both carry the same letters</dd>
          <dt>Template</dt>
          <dd>pieces of the same shape share one</dd>
          <dt>Hand</dt>
          <dd>left or right: a form and its mirror image; they never fit each other's place</dd>
          <dt>Height</dt>
          <dd>the diameter of the sphere through the solid's vertices</dd>
        </dl>
      </section>
      <section>
        <h3>Keys</h3>
        <dl class="pairs">
          {keys.map(([key, what]) => [<dt key={key}>{key}</dt>, <dd key={`${key} does`}>{what}</dd>])}
        </dl>
      </section>
      <section>
        <h3>This screen</h3>
        <div class="row">
          <label>
            Light or dark
            <select
              value={prefs.theme.value}
              onChange={(event) => {
                prefs.theme.value = event.currentTarget.value as Theme
              }}
            >
              <option value="system">as the system</option>
              <option value="light">light</option>
              <option value="dark">dark</option>
            </select>
          </label>
          <label>
            Draw models
            <select
              value={prefs.view.value}
              onChange={(event) => {
                prefs.view.value = event.currentTarget.value as ViewMode
              }}
            >
              <option value="auto">the quickest way here</option>
              <option value="webgl">with WebGL</option>
              <option value="plain">without WebGL</option>
            </select>
          </label>
          <label>
            Single keys (1 to 4, G)
            <select
              value={prefs.keys.value}
              onChange={(event) => {
                prefs.keys.value = event.currentTarget.value as 'on' | 'off'
              }}
            >
              <option value="on">on</option>
              <option value="off">off</option>
            </select>
          </label>
        </div>
      </section>
      <section>
        <h3>Cautions</h3>
        <Cautions />
      </section>
    </Dialog>
  )
}
