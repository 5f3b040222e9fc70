/**
 * What counts as motion in a stimulus: `location` removes each location's mean on each axis (nothing constant counts),
 * `axis` removes the mean of each axis over locations and frames, `none` removes nothing (a constant common drift counts as shared).
 */
export type Centring = 'location' | 'axis' | 'none';
