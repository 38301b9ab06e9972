import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import {
  inviteSchema,
  roles,
  teamLimits,
  type Invitation,
  type Role,
} from '../../../shared/contract/index.ts';
import { newKey } from '../../api/new-key.ts';
import { asProblem } from '../../api/problem-error.ts';
import { saySeconds, type RateStanding } from '../../api/rate-standing.ts';
import { invite, teamQueries, withdrawInvitation } from '../../api/teams.ts';
import {
  Button,
  Moment,
  Panel,
  SelectField,
  TextField,
  Waiting,
  icons,
  useToast,
} from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { sayRole } from '../../forms/say-role.ts';
import { useSubmit } from '../../forms/use-submit.ts';

/** Invites by e-mail, and shows what is still open. */
export function InvitationsPanel({ team }: { team: string }) {
  const { data: invitations, error, refetch } = useQuery(teamQueries.invitations(team));
  return (
    <Panel title="Invitations">
      <InviteForm team={team} open={invitations?.length ?? 0} />
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {invitations === undefined && !error && <Waiting>Reading the invitations…</Waiting>}
      {invitations?.length === 0 && <p className="quiet">No invitation is open.</p>}
      {invitations !== undefined && invitations.length > 0 && (
        <table role="table" className="ledger people">
          <caption>
            Open invitations, {invitations.length} of at most {teamLimits.openInvitations}. Each link works
            once, for 7 days, for its address alone.
          </caption>
          <thead role="rowgroup">
            <tr role="row">
              <th role="columnheader" scope="col">
                Address
              </th>
              <th role="columnheader" scope="col">
                Role
              </th>
              <th role="columnheader" scope="col">
                Mail
              </th>
              <th role="columnheader" scope="col">
                Runs out
              </th>
              <th role="columnheader" scope="col">
                <span className="sr-only">Actions</span>
              </th>
            </tr>
          </thead>
          <tbody role="rowgroup">
            {invitations.map((invitation) => (
              <InvitationRow key={invitation.id} team={team} invitation={invitation} />
            ))}
          </tbody>
        </table>
      )}
    </Panel>
  );
}

const nobody: { email: string; role: Role } = { email: '', role: 'viewer' };

function InviteForm({ team, open }: { team: string; open: number }) {
  const [typed, setTyped] = useState(nobody);
  const [key, setKey] = useState(newKey);
  const [rates, setRates] = useState<readonly RateStanding[]>([]);
  const queryClient = useQueryClient();
  const toast = useToast();
  const change = (part: Partial<typeof typed>) => {
    setTyped({ ...typed, ...part });
    setKey(newKey());
  };
  const inviting = useSubmit(async (wanted: typeof typed) => {
    const answer = await invite(team, wanted, key);
    setRates(answer.rates);
    toast({ message: `${answer.data.email} is invited as ${answer.data.role}.`, tone: 'good' });
    change({ email: '' });
    await queryClient.invalidateQueries({ queryKey: teamQueries.invitations(team).queryKey });
  }, inviteSchema);
  const left = rates.find(({ policy }) => policy === 'invitations');
  return (
    <Form
      label="Invite somebody"
      action="Invite"
      submitting={inviting}
      onSubmit={() => void inviting.submit(typed)}
      fields={['email', 'role']}
      refusedBecause={
        open >= teamLimits.openInvitations
          ? `A team has at most ${teamLimits.openInvitations} open invitations. Withdraw one first.`
          : undefined
      }
      aside={
        left &&
        left.remaining <= 20 && (
          <span className="quiet">
            {left.remaining} more in the next {saySeconds(left.resetSeconds)}
          </span>
        )
      }
    >
      <div className="invite-fields">
        <TextField
          label="E-mail address"
          type="email"
          autoComplete="off"
          value={typed.email}
          onChange={(email) => change({ email })}
          problem={inviting.at('email')}
        />
        <SelectField
          label="Role"
          value={typed.role}
          options={roles.map((role) => ({ value: role, label: role, hint: sayRole(role) }))}
          onChange={(role) => change({ role })}
          problem={inviting.at('role')}
        />
      </div>
    </Form>
  );
}

const deliveries = {
  waiting: { words: 'on its way', Sign: icons.hourglass },
  sent: { words: 'sent', Sign: icons.good },
  undelivered: { words: 'could not be delivered', Sign: icons.fault },
} as const;

function InvitationRow({ team, invitation }: { team: string; invitation: Invitation }) {
  const queryClient = useQueryClient();
  const toast = useToast();
  const withdrawing = useMutation({
    mutationFn: () => withdrawInvitation(team, invitation.id),
    onSuccess: () => toast(`The invitation of ${invitation.email} was withdrawn.`),
    onError: (fault) => toast({ message: fault.message, tone: 'fault' }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: teamQueries.invitations(team).queryKey }),
  });
  const { words, Sign } = deliveries[invitation.delivery];
  return (
    <tr role="row">
      <td role="cell">
        <span className="people-name">{invitation.email}</span>
        {invitation.invitedBy !== null && (
          <span className="people-address">invited by {invitation.invitedBy}</span>
        )}
      </td>
      <td role="cell">{invitation.role}</td>
      <td role="cell">
        <span className="flex items-center gap-1">
          <Sign width="16" height="16" />
          {words}
        </span>
      </td>
      <td role="cell" data-word="runs out">
        <Moment at={invitation.expiresAt} />
      </td>
      <td role="cell">
        <Button
          size="small"
          isDisabled={withdrawing.isPending}
          aria-label={`Withdraw the invitation of ${invitation.email}`}
          onPress={() => withdrawing.mutate()}
        >
          Withdraw
        </Button>
      </td>
    </tr>
  );
}
