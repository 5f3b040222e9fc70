/** Which page of a list: where it starts (a cursor that the list gave out) and how many items at most (50 if left out). */
export interface PageInput {
  cursor?: string;
  limit?: number;
}
