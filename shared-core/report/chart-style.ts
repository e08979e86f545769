/**
 * How charts on paper look. Series colours are the set of Okabe and Ito, told apart by dash and marker as well.
 *
 * @source [Okabe2008]: colours safe for the common kinds of colour blindness
 */
export const ink = {
  text: '#1C2024',
  muted: '#585F67',
  rule: '#D9D6CE',
  axis: '#8B9098',
  data: '#1C2024',
  model: '#D55E00',
  baseline: '#0072B2',
  band: '#56B4E9',
  window: '#56B4E9',
  clipped: '#CC79A7',
  bar: '#0072B2',
  strip: '#F4F2EC',
} as const;

/** Dashes in user units. */
export const dashes = { baseline: '4 2.5', guide: '1.5 2.5', unsupported: '6 3' } as const;
