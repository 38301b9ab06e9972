import type { Hindrance, RevisionState } from '../../../shared/contract/index.ts';

const stateWords: Readonly<Record<RevisionState, string>> = {
  draft: 'is a draft that nobody has submitted',
  'in-review': 'is in review already',
  vetted: 'is vetted',
  returned: 'was returned; mending it makes the next revision',
  withdrawn: 'was withdrawn',
};

const rules = {
  submit: { role: 'Submitting takes the role author.', wanted: 'a draft' },
  judge: { role: 'Judging takes the role reviewer.', wanted: 'one in review' },
  withdraw: { role: 'Withdrawing takes the role reviewer.', wanted: 'a vetted one' },
} as const;

export type Act = keyof typeof rules;

/** Says why somebody may not do something with a revision now; `null` where they may. */
export function sayHindrance(act: Act, hindrance: Hindrance, state: RevisionState): string | null {
  switch (hindrance) {
    case null:
      return null;
    case 'role':
      return rules[act].role;
    case 'own-revision':
      return `The two-person rule: somebody else must ${act} what you made.`;
    case 'state':
      if (act === 'submit' && state === 'draft') return 'The table is archived: restore it first.';
      return `This revision ${stateWords[state]}; only ${rules[act].wanted} can be ${pastOf[act]}.`;
  }
}

const pastOf = { submit: 'submitted', judge: 'judged', withdraw: 'withdrawn' } as const;

const minuteMs = 60_000;
const steps = [
  { unit: 'minute', ms: minuteMs, below: 60 * minuteMs },
  { unit: 'hour', ms: 60 * minuteMs, below: 48 * 60 * minuteMs },
  { unit: 'day', ms: 24 * 60 * minuteMs, below: Infinity },
] as const;

/** How long something has been going on: `less than a minute`, `5 minutes`, `3 hours`, `12 days`. */
export function saySince(at: string, now: number): string {
  const span = Math.max(0, now - Date.parse(at));
  if (span < minuteMs) return 'less than a minute';
  const { unit, ms } = steps.find(({ below }) => span < below) ?? steps[2];
  const count = Math.floor(span / ms);
  return `${count} ${unit}${count === 1 ? '' : 's'}`;
}
