/** What is counted, as the forms need it. */
export interface CountTarget {
  readonly id: string;
  readonly plural: string;
  readonly countingRule: string;
  readonly wholeNumbers: boolean;
}
