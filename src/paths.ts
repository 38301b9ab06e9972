const part = encodeURIComponent;

/** Every address of the client, in one place. Patterns have their parameters as `:name`. */
export const paths = {
  bench: '/',
  /** The bench, with the way in for what exists already. */
  bringIn: '/?open=shape&bring-in',
  /** The wave stands in the fragment, which browsers keep to themselves. */
  sharedWave: '/wave',

  /** These lead to the team in use, or say what to do first. */
  anyTables: '/tables',
  anyReviews: '/reviews',
  anyBoards: '/boards',
  anyTeam: '/team',
  newTeam: '/new-team',
  audit: '/teams/:team/audit',
  team: '/teams/:team',
  tables: '/teams/:team/tables',
  table: '/teams/:team/tables/:table',
  boards: '/teams/:team/boards',
  newBoard: '/teams/:team/new-board',
  board: '/teams/:team/boards/:board',
  editBoard: '/teams/:team/boards/:board/edit',
  reviews: '/teams/:team/reviews',
  review: '/teams/:team/tables/:table/revisions/:number/review',
  /** Two revisions side by side: `?a=slug:3&b=slug:5`. */
  compare: '/teams/:team/compare',
  /** Puts a revision on the bench. */
  openRevision: '/teams/:team/tables/:table/revisions/:number/bench',

  signUp: '/sign-up',
  signIn: '/sign-in',
  forgotPassword: '/forgot-password',
  account: '/account',
  /** Mailed links lead to these, with their token in the fragment. */
  verify: '/verify',
  resetPassword: '/reset-password',
  confirmAddress: '/confirm-address',
  invitation: '/invitation',
  unsubscribe: '/unsubscribe',

  mailbox: '/mailbox',
  /** `/api` itself belongs to the server. */
  api: '/http-api',
} as const;

export const teamPath = (team: string) => `/teams/${part(team)}`;
export const tablesPath = (team: string, query = '') => `${teamPath(team)}/tables${query && `?${query}`}`;

export const tablePath = (team: string, table: string, revision?: number) =>
  `${tablesPath(team)}/${part(table)}${revision === undefined ? '' : `?revision=${revision}`}`;

export const openRevisionPath = (team: string, table: string, revision: number) =>
  `${tablesPath(team)}/${part(table)}/revisions/${revision}/bench`;

export const boardsPath = (team: string) => `${teamPath(team)}/boards`;
export const newBoardPath = (team: string) => `${teamPath(team)}/new-board`;

export const boardPath = (team: string, board: string, revision?: number) =>
  `${boardsPath(team)}/${part(board)}${revision === undefined ? '' : `?revision=${revision}`}`;

export const editBoardPath = (team: string, board: string) => `${boardPath(team, board)}/edit`;

/** The bench, with what the board makes of the codes in sight. */
export const boardOnBenchPath = (team: string, board: string) =>
  `${paths.bench}?open=output&more=stage&board=${part(team)}/${part(board)}`;

export const reviewsPath = (team: string) => `${teamPath(team)}/reviews`;

export const reviewPath = (team: string, table: string, revision: number) =>
  `${tablesPath(team)}/${part(table)}/revisions/${revision}/review`;

/** A revision in an address: `fog-signal:3`. */
export const revisionText = (table: string, revision: number) => `${table}:${revision}`;

export const comparePath = (team: string, a?: string, b?: string) => {
  const query = [a && `a=${a}`, b && `b=${b}`].filter(Boolean).join('&');
  return `${teamPath(team)}/compare${query && `?${query}`}`;
};

export const auditPath = (team: string) => `${teamPath(team)}/audit`;

/** The sign-in page, which goes on to `to`. */
export const signInPath = (to: string) => `${paths.signIn}?${new URLSearchParams({ to })}`;

/** An address to go on to, if it is one of ours: `//host` and `/\host` would lead away. */
export const ownPath = (to: string | null): string | null =>
  to !== null && /^\/(?![/\\])/.test(to) ? to : null;
