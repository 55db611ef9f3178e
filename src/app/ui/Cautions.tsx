import { cautions, cautionsEnd } from '../../drawing'

export const Cautions = () => (
  <div class="cautions">
    <dl>
      {cautions.map(({ title, text }) => (
        <div key={title}>
          <dt>{title}</dt>
          <dd>{text}</dd>
        </div>
      ))}
    </dl>
    <p>{cautionsEnd}</p>
  </div>
)
