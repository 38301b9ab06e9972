import { useQuery } from '@tanstack/react-query';
import type { AuditAsk } from '../../api/audit.ts';
import { teamQueries } from '../../api/teams.ts';
import { Button, SelectField, TextField, type SelectOption } from '../../components/index.ts';
import { actionOptions } from './action-options.ts';
import { isFiltered } from './audit-query.ts';
import { SubjectField } from './subject-field.tsx';

interface AuditFiltersProps {
  team: string;
  query: AuditAsk;
  /** '' takes a filter away. */
  onChange: (part: AuditAsk) => void;
  onClear: () => void;
}

const any: SelectOption = { value: '', label: 'any' };

/** What is chosen stays in the list, even where nobody would find it there. */
const withChosen = (options: readonly SelectOption[], chosen: string | undefined, label: string) =>
  chosen === undefined || options.some(({ value }) => value === chosen)
    ? [any, ...options]
    : [any, ...options, { value: chosen, label }];

/** What the trail is narrowed by. All of it stands in the address. */
export function AuditFilters({ team, query, onChange, onClear }: AuditFiltersProps) {
  const { data: members = [] } = useQuery(teamQueries.members(team));
  const people = members.map(({ userId, name }) => ({ value: String(userId), label: name }));
  return (
    <search className="audit-filters" aria-label="Events">
      <SelectField
        label="Who"
        value={query.actor ?? ''}
        options={withChosen(people, query.actor, `no member now (number ${query.actor ?? ''})`)}
        onChange={(actor) => onChange({ actor })}
      />
      <SelectField
        label="What"
        value={query.action ?? ''}
        options={withChosen(actionOptions, query.action, query.action ?? '')}
        onChange={(action) => onChange({ action })}
      />
      <SubjectField
        key={query.subject ?? ''}
        subject={query.subject ?? ''}
        onChange={(subject) => onChange({ subject })}
      />
      <TextField label="From" type="date" value={query.from ?? ''} onChange={(from) => onChange({ from })} />
      <TextField label="To" type="date" value={query.to ?? ''} onChange={(to) => onChange({ to })} />
      {isFiltered(query) && (
        <Button variant="quiet" onPress={onClear}>
          Clear the filters
        </Button>
      )}
    </search>
  );
}
