/** What can hurt someone at this work. Shown in the app and printed on the docket page. */
export const cautions: readonly { title: string; text: string }[] = [
  {
    title: 'Blades',
    text: 'Keep the holding hand behind the cut. Use a metal safety ruler and a mat larger than the work. Used blades go into a sharps container.',
  },
  {
    title: 'Glue',
    text: 'Ventilate with spray and contact adhesive. Cyanoacrylate is not for children: in an eye, rinse for 15 minutes and get medical help. Hot melt reaches about 195 °C.',
  },
  { title: 'Small parts', text: 'Parts that fit a cylinder of 31.7 × 57 mm are not for children under 3.' },
  { title: 'Spikes', text: 'Sharp points are an eye hazard, on the bench and on the finished model.' },
  {
    title: 'Laser',
    text: 'Never unattended; extraction on, extinguisher at hand. No PVC or vinyl, never stacked sheets. The rules of the site come first.',
  },
  { title: 'Breaks', text: 'Rest 5 to 10 minutes every hour.' },
]

export const cautionsEnd = 'Local rules and trained operators decide; this advice does not replace them.'
