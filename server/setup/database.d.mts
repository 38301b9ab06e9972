export interface HeldDatabase {
  readonly socket: string;
  /** Process number of the server, undefined while it is down. */
  pid(): number | undefined;
  /** URL of the database `name` on this server. */
  urlOf(name: string): string;
  release(): Promise<void>;
}

/** Starts or joins the private MariaDB in `folder`; the last holder's `release` stops it. */
export function holdDatabase(folder: string): Promise<HeldDatabase>;
