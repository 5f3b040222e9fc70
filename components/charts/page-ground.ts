/** Colour of the page's paper in the theme that is shown; pictures that leave the page are drawn on it. */
export function pageGround(): string {
  return getComputedStyle(document.documentElement).getPropertyValue('--paper').trim() || '#fff';
}
