import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { LimitSet } from '../../../shared/contract/index.ts';
import { limitSetQueries, removeLimitSet } from '../../api/limit-sets.ts';
import { asProblem } from '../../api/problem-error.ts';
import { Button, Dialog, Panel, Waiting, icons, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { LimitLines, LimitsForm } from './limits-form.tsx';

interface LimitsPanelProps {
  team: string;
  isAdmin: boolean;
}

type Editing = { readonly set: LimitSet | null; readonly isForTag: boolean };

/** What a table has to keep to be vetted: in general, and for the tables of a tag. Admins set it, everybody reads it. */
export function LimitsPanel({ team, isAdmin }: LimitsPanelProps) {
  const { data: sets, error, refetch } = useQuery(limitSetQueries.list(team));
  const [editing, setEditing] = useState<Editing | null>(null);
  const [going, setGoing] = useState<LimitSet | null>(null);
  const hasGeneral = sets?.some(({ tag }) => tag === null) ?? false;
  return (
    <Panel title="Limits for vetting">
      <p className="quiet">
        The bench shows while shaping whether they are kept; a review shows it too, and vetting against a
        broken one takes a written reason. {!isAdmin && 'An admin sets them.'}
      </p>
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {sets === undefined && !error && <Waiting>Reading the limits…</Waiting>}
      {sets?.length === 0 && (
        <p>
          None are set, so anything can be vetted. A first one could be: SNR at least 40 dB, clipped at most 0
          entries.
        </p>
      )}
      {sets !== undefined && sets.length > 0 && (
        <ul className="limit-sets">
          {sets.map((set) => (
            <li key={set.id}>
              <div className="limit-set-head">
                <h3>{set.tag === null ? 'All tables' : `Tables tagged ${set.tag}`}</h3>
                {isAdmin && (
                  <>
                    <Button
                      size="small"
                      aria-label={`Change the limits of ${nameOf(set)}`}
                      onPress={() => setEditing({ set, isForTag: set.tag !== null })}
                    >
                      Change
                    </Button>
                    <Button
                      size="small"
                      aria-label={`Remove the limits of ${nameOf(set)}`}
                      onPress={() => setGoing(set)}
                    >
                      Remove
                    </Button>
                  </>
                )}
              </div>
              <LimitLines limits={set.limits} />
            </li>
          ))}
        </ul>
      )}
      {isAdmin && sets !== undefined && (
        <div className="form-actions">
          {!hasGeneral && (
            <Button icon={icons.add} onPress={() => setEditing({ set: null, isForTag: false })}>
              Set limits for all tables
            </Button>
          )}
          <Button icon={icons.add} onPress={() => setEditing({ set: null, isForTag: true })}>
            Set limits for a tag
          </Button>
        </div>
      )}
      <Dialog
        title={editing === null ? 'Limits' : titleOf(editing)}
        size="wide"
        isOpen={editing !== null}
        onClose={() => setEditing(null)}
      >
        {editing !== null && <LimitsForm team={team} {...editing} onDone={() => setEditing(null)} />}
      </Dialog>
      <RemoveDialog key={going?.id} team={team} set={going} onClose={() => setGoing(null)} />
    </Panel>
  );
}

const nameOf = ({ tag }: LimitSet) => (tag === null ? 'all tables' : `tables tagged ${tag}`);

const titleOf = ({ set, isForTag }: Editing) =>
  set === null
    ? isForTag
      ? 'Limits for the tables of a tag'
      : 'Limits for all tables'
    : `Limits for ${nameOf(set)}`;

interface RemoveDialogProps {
  team: string;
  set: LimitSet | null;
  onClose: () => void;
}

/** Asks before limits go. */
function RemoveDialog({ team, set, onClose }: RemoveDialogProps) {
  const queryClient = useQueryClient();
  const toast = useToast();
  const removing = useSubmit(async (gone: LimitSet) => {
    await removeLimitSet(team, gone);
    onClose();
    toast(`The limits of ${nameOf(gone)} are gone.`);
    await queryClient.invalidateQueries({ queryKey: limitSetQueries.all(team) });
  });
  return (
    <Dialog
      title="Remove these limits"
      isOpen={set !== null}
      onClose={onClose}
      actions={
        <>
          <Button
            variant="danger"
            isDisabled={removing.isBusy}
            onPress={() => {
              if (set !== null) void removing.submit(set);
            }}
          >
            Remove
          </Button>
          <Button onPress={onClose}>Leave them</Button>
        </>
      }
    >
      <div className="space-y-2">
        <p>
          They no longer count for {set === null ? 'tables' : nameOf(set)}. What was vetted keeps the limits
          it was vetted against.
        </p>
        {set !== null && <LimitLines limits={set.limits} />}
        <ProblemNotice
          fault={removing.fault}
          actions={
            removing.fault?.status === 412 && (
              <Button
                size="small"
                onPress={() => {
                  onClose();
                  void queryClient.invalidateQueries({ queryKey: limitSetQueries.all(team) });
                }}
              >
                Look at them again
              </Button>
            )
          }
        />
      </div>
    </Dialog>
  );
}
