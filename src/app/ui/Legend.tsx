/** The lines as they print: the line convention of 1954. */
const lines: readonly { name: string; dash: string; what: string }[] = [
  { name: 'Cut', dash: '', what: 'solid' },
  { name: 'Mountain fold', dash: '9 3 2 3', what: 'dash-dot: both sides bend away from you' },
  { name: 'Valley fold', dash: '6 4', what: 'dashed: both sides bend towards you' },
]

export const Legend = () => (
  <ul class="legend">
    {lines.map(({ name, dash, what }) => (
      <li key={name}>
        <svg viewBox="0 0 60 8" aria-hidden="true">
          <path d="M1 4H59" stroke="currentColor" stroke-width="1.6" stroke-dasharray={dash} fill="none" />
        </svg>
        <span>
          <b>{name}</b> {what}
        </span>
      </li>
    ))}
  </ul>
)
