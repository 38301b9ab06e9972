import { useQueryClient } from '@tanstack/react-query';
import type { Team } from '../../../shared/contract/index.ts';
import { reviewQueries } from '../../api/reviews.ts';
import { changeTeam, teamQueries } from '../../api/teams.ts';
import { Panel, SwitchField, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { teamOfLostRace } from './lost-race.ts';

interface TwoPersonPanelProps {
  team: Team & { readonly etag: string };
  isAdmin: boolean;
}

const meaning = 'Nobody vets, returns or withdraws a revision that they made or submitted themselves.';

/** Whether whoever judges a revision must be somebody other than its author. */
export function TwoPersonPanel({ team, isAdmin }: TwoPersonPanelProps) {
  const queryClient = useQueryClient();
  const toast = useToast();
  const { queryKey } = teamQueries.detail(team.slug);
  const changing = useSubmit(async (twoPersonRule: boolean) => {
    try {
      queryClient.setQueryData(queryKey, await changeTeam(team.slug, { twoPersonRule }, team.etag));
    } catch (error) {
      // What stands there now is shown; the switch is pressed again where that is still wanted.
      const theirs = teamOfLostRace(error);
      if (theirs !== null) queryClient.setQueryData(queryKey, theirs);
      throw error;
    }
    toast({ message: `The two-person rule is ${twoPersonRule ? 'on' : 'off'}.`, tone: 'good' });
    await queryClient.invalidateQueries({ queryKey: reviewQueries.all(team.slug) });
  });
  return (
    <Panel title="Two-person rule">
      {isAdmin ? (
        <SwitchField
          label="Somebody else must judge"
          description={meaning}
          isOn={team.twoPersonRule}
          isDisabled={changing.isBusy}
          onChange={(isOn) => void changing.submit(isOn)}
        />
      ) : (
        <p>
          {team.twoPersonRule ? `On. ${meaning}` : 'Off: reviewers may judge what they made themselves.'}{' '}
          <span className="quiet">An admin sets it.</span>
        </p>
      )}
      <ProblemNotice fault={changing.fault} />
    </Panel>
  );
}
