export interface AppProcess {
  /** The address it is open at; rejects where it ends before that. */
  readonly ready: Promise<string>;
  /** Its exit status. */
  readonly ended: Promise<number>;
  stop(): Promise<void>;
}

/** The application as a child process that ends with this one. */
export function startApp(args: readonly string[], env: Readonly<Record<string, string>>): AppProcess;
