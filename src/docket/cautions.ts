/** What can hurt someone at this work. Shown in the app and printed on the docket page. */
export const cautions: readonly string[] = [
  'Blades: keep the holding hand behind the cut, use a metal safety ruler and a mat larger than the work, and put used blades in a sharps container.',
  'Glue: follow its label. Ventilate with spray and contact adhesive. Instant glue is not for children; if it gets in an eye, rinse for 15 minutes and get medical help. Hot melt burns.',
  'Small parts are not for children under 3. Spikes are an eye hazard.',
  'Take a break of 5 to 10 minutes every hour.',
  'Local rules and trained operators decide; this advice does not replace them.',
]
