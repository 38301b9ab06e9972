/** One entry of the header's navigation. */
export interface Place {
  label: string;
  to: string;
}
