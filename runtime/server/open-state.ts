// What the server tells the page of the notebook it follows.

/** A place in a file where something is wrong. */
export interface ProblemPlace {
  file: string;
  /** 1-based; 0 when unknown */
  line: number;
  text: string;
}

export interface OpenState {
  /** label of the notebook: "notebooks/trade-study.ts" */
  label: string;
  /** address of the page's own script; another one means another version of the program */
  page: string;
  /** address of the last good version of the notebook; none if there was no good one yet */
  notebook?: string;
  /** changes with the files that the notebook imports: then every cell must be evaluated again */
  imports?: string;
  /** why the file as it is now can't be used; empty when it can */
  problems: ProblemPlace[];
}
