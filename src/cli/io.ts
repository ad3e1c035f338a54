/** The world as a command sees it; tests give their own. */
export interface Io {
  readonly stdout: (text: string) => void;
  readonly stderr: (text: string) => void;
  readonly stdin: () => Promise<string>;
  /** Whether standard output takes terminal colours. */
  readonly color: boolean;
  /** Whether standard error is a terminal on which a progress line may be drawn. */
  readonly interactive: boolean;
}

/** Exit codes: 0 done, 1 the input is at fault, 2 this program is, 3 a question was left undecided within the bound. */
export const EXIT = { done: 0, input: 1, fault: 2, undecided: 3 } as const;
