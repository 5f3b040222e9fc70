/** An interval with its level (0.95) and its method in words. Both ends are finite. */
export interface Interval {
  low: number;
  high: number;
  level: number;
  method: string;
}
