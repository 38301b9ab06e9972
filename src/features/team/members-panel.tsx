import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { roles, teamLimits, type Member, type Role } from '../../../shared/contract/index.ts';
import { accountHasChanged } from '../../api/account-state.ts';
import { asProblem } from '../../api/problem-error.ts';
import { changeRole, removeMember, teamQueries } from '../../api/teams.ts';
import { Button, Dialog, Moment, Panel, SelectField, Waiting, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { sayRole } from '../../forms/say-role.ts';
import { paths } from '../../paths.ts';

interface MembersPanelProps {
  team: string;
  isAdmin: boolean;
  ownId: number | undefined;
}

/** Who belongs to the team. Admins change roles and remove; anybody may leave, but for the last admin. */
export function MembersPanel({ team, isAdmin, ownId }: MembersPanelProps) {
  const { data: members, error, refetch } = useQuery(teamQueries.members(team));
  const [going, setGoing] = useState<Member | null>(null);
  const admins = members?.filter(({ role }) => role === 'admin').length ?? 0;
  return (
    <Panel title={members === undefined ? 'Members' : `Members: ${members.length}`}>
      {!isAdmin && <p className="quiet">Roles are changed and members removed by an admin.</p>}
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {members === undefined && !error && <Waiting>Reading the members…</Waiting>}
      {members !== undefined && (
        <table role="table" className="ledger people">
          <caption>A team has at most {teamLimits.members} members and at least one admin.</caption>
          <thead role="rowgroup">
            <tr role="row">
              <th role="columnheader" scope="col">
                Who
              </th>
              <th role="columnheader" scope="col">
                Role
              </th>
              <th role="columnheader" scope="col">
                Since
              </th>
              <th role="columnheader" scope="col">
                <span className="sr-only">Actions</span>
              </th>
            </tr>
          </thead>
          <tbody role="rowgroup">
            {members.map((member) => (
              <MemberRow
                key={member.userId}
                {...{ team, member, isAdmin }}
                isSelf={member.userId === ownId}
                isLastAdmin={member.role === 'admin' && admins === 1}
                onGo={() => setGoing(member)}
              />
            ))}
          </tbody>
        </table>
      )}
      <GoDialog
        key={going?.userId}
        team={team}
        member={going}
        isSelf={going?.userId === ownId}
        onClose={() => setGoing(null)}
      />
    </Panel>
  );
}

interface MemberRowProps {
  team: string;
  member: Member;
  isAdmin: boolean;
  isSelf: boolean;
  isLastAdmin: boolean;
  onGo: () => void;
}

const lastAdmin = 'The last admin stays: make somebody else one first';

function MemberRow({ team, member, isAdmin, isSelf, isLastAdmin, onGo }: MemberRowProps) {
  const queryClient = useQueryClient();
  const toast = useToast();
  const changing = useMutation({
    mutationFn: (role: Role) => changeRole(team, member.userId, role),
    onSuccess: ({ name, role }) => toast({ message: `${name} is ${role} now.`, tone: 'good' }),
    onError: (fault) => toast({ message: fault.message, tone: 'fault' }),
    onSettled: async () => {
      await queryClient.invalidateQueries({ queryKey: teamQueries.all });
      if (isSelf) await accountHasChanged();
    },
  });
  const shown = changing.isPending ? changing.variables : member.role;
  return (
    <tr role="row">
      <td role="cell">
        <span className="people-name">
          {member.name}
          {isSelf && ' (you)'}
        </span>
        <span className="people-address">{member.email}</span>
      </td>
      <td role="cell">
        {isAdmin && !isLastAdmin ? (
          <SelectField
            label={`Role of ${member.name}`}
            hideLabel
            value={shown}
            options={roles.map((role) => ({ value: role, label: role }))}
            onChange={(role) => changing.mutate(role)}
            isDisabled={changing.isPending}
          />
        ) : (
          <span title={sayRole(member.role)}>{member.role}</span>
        )}
      </td>
      <td role="cell" data-word="since">
        <Moment at={member.since} />
      </td>
      <td role="cell">
        {(isAdmin || isSelf) && (
          <Button
            size="small"
            onPress={onGo}
            isDisabled={isLastAdmin}
            disabledReason={lastAdmin}
            aria-label={isSelf ? 'Leave the team' : `Remove ${member.name}`}
          >
            {isSelf ? 'Leave' : 'Remove'}
          </Button>
        )}
        {isSelf && isLastAdmin && <span className="quiet block">{lastAdmin}.</span>}
      </td>
    </tr>
  );
}

interface GoDialogProps {
  team: string;
  member: Member | null;
  isSelf: boolean;
  onClose: () => void;
}

/** Asks before somebody goes. */
function GoDialog({ team, member, isSelf, onClose }: GoDialogProps) {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const toast = useToast();
  const removing = useMutation({
    mutationFn: (userId: number) => removeMember(team, userId),
    onSuccess: async () => {
      onClose();
      toast(isSelf ? 'You have left the team.' : `${member?.name} was removed.`);
      if (!isSelf) return queryClient.invalidateQueries({ queryKey: teamQueries.members(team).queryKey });
      await accountHasChanged();
      await navigate(paths.anyTeam);
      queryClient.removeQueries({ queryKey: [...teamQueries.all] });
    },
  });
  return (
    <Dialog
      title={isSelf ? 'Leave the team' : `Remove ${member?.name ?? ''}`}
      isOpen={member !== null}
      onClose={onClose}
      actions={
        <>
          <Button
            variant="danger"
            isDisabled={removing.isPending}
            onPress={() => member && removing.mutate(member.userId)}
          >
            {isSelf ? 'Leave' : 'Remove'}
          </Button>
          <Button onPress={onClose}>Stay as it is</Button>
        </>
      }
    >
      <p>
        {isSelf
          ? 'You will no longer see the team’s tables. To come back you need a new invitation.'
          : 'They will no longer see the team’s tables. What they saved stays. To come back they need a new invitation.'}
      </p>
      <ProblemNotice fault={removing.error && asProblem(removing.error)} />
    </Dialog>
  );
}
