import type { TeamStart } from '../../../api/team-defaults.ts';
import { examples, type Example } from '../state/examples.ts';
import type { ExportChoice, Work } from '../state/wave.ts';

/** A wave to start anew from, and what it makes of the work on the bench. */
export interface Start {
  readonly id: string;
  readonly title: string;
  readonly summary: string;
  readonly begin: (work: Work) => Work;
}

/** Waves to start anew from. With a team in use its defaults hold: a plain sine of its size comes first. */
export function startsFor(team: TeamStart | null): Start[] {
  const worked = examples.map(({ id, title, summary, work }): Start => ({
    id,
    title,
    summary,
    begin: ({ exporting }) => ({ ...work, exporting: exportingFor(team, exporting) }),
  }));
  return team === null ? worked : [plainSine(team), ...worked];
}

const sine: Example | undefined = examples.find(({ id }) => id === 'self-test');

function plainSine(team: TeamStart): Start {
  const { length, bits } = team.defaults;
  const { work } = sine ?? examples[0];
  const entries = `${length.toLocaleString('en')} ${length === 1 ? 'entry' : 'entries'}`;
  return {
    id: 'team',
    title: 'Plain sine',
    summary: `as ${team.teamName} begins, ${entries} of ${bits} ${bits === 1 ? 'bit' : 'bits'}`,
    begin: ({ exporting }) => ({
      ...work,
      definition: {
        ...work.definition,
        name: 'New wave',
        table: { ...work.definition.table, length, bits },
      },
      exporting: exportingFor(team, exporting),
    }),
  };
}

/** The team's target, prefix and licence line; other options stay as they were typed. */
function exportingFor(team: TeamStart | null, exporting: ExportChoice): ExportChoice {
  if (team === null) return exporting;
  const { target, arrayPrefix, licenceLine } = team.defaults;
  const { options } = exporting;
  return { target, options: { ...options, [target]: { ...options[target], arrayPrefix, licenceLine } } };
}
