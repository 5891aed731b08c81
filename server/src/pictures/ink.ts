/**
 * The colours of the pictures: middle tones, of which each stands off from white and from the near-black of dark themes by 3:1 or more
 * (WCAG 2.2, 1.4.11), since a picture in a hover cannot know what it lies on.
 */
export const ink = {
  /** Axes, words. */
  text: '#808080',
  grid: '#80808055',
  /** What is measured, and is as it should be. */
  good: '#2f86d6',
  /** What is more than is tolerated. */
  over: '#d9534f',
  /** A limit. */
  limit: '#b07a1e',
  copper: '#c07a3a',
  reference: '#7d8a96',
  second: '#8e6fc9',
  third: '#2f9468',
} as const;
