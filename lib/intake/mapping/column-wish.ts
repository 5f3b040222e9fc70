/** A column as the mapping asks for it. */
export interface ColumnWish {
  name: string;
  path: string;
  type: 'number' | 'category' | 'circular';
  periodDeg?: number;
}
