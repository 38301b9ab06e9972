/** So many requests in so many seconds. */
export interface RatePolicy {
  readonly quota: number;
  readonly seconds: number;
}

const minute = 60;
const hour = 60 * minute;
const day = 24 * hour;

/** Every limit on the rate of requests. Each is counted for all processes together, in the database. */
export const ratePolicies = {
  /** The whole API, for one signed-in person. */
  api: { quota: 6000, seconds: minute },
  /** The whole API, for all who are not signed in at one network address. */
  'api-unknown': { quota: 1200, seconds: minute },
  /** Tries at one account from one network address; a success clears it. */
  'sign-in': { quota: 10, seconds: 15 * minute },
  /** Tries at any account from one network address. */
  'sign-in-network': { quota: 100, seconds: 15 * minute },
  /** Tries at one account from anywhere: at most 100 (NIST SP 800-63B §5.2.2); a success clears it. */
  'sign-in-address': { quota: 100, seconds: day },
  /** Sign-ups from one network address. */
  'sign-up': { quota: 60, seconds: hour },
  /** Requests for mail to oneself from one network address: forgotten passwords, new verification links. */
  'mail-request': { quota: 30, seconds: hour },
  /** Mail that anybody can make us send to one address. */
  'mail-to-address': { quota: 6, seconds: hour },
  /** Tries of the current password by somebody signed in. */
  'password-check': { quota: 10, seconds: 15 * minute },
  /** Tries of mailed links from one network address. */
  'link-use': { quota: 120, seconds: hour },
  /** Invitations by one team. */
  invitations: { quota: 100, seconds: day },
  /** Revisions that one person submits: each sends mail to every reviewer. */
  submissions: { quota: 200, seconds: hour },
  /** Comments by one person: each sends mail. */
  comments: { quota: 200, seconds: hour },
} as const satisfies Readonly<Record<string, RatePolicy>>;

export type RatePolicyName = keyof typeof ratePolicies;
