import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { changeTeamSchema, limits, type Team, type TeamDefaults } from '../../../shared/contract/index.ts';
import { parseQuantity } from '../../../shared/quantities/index.ts';
import { forgetTeamDefaults } from '../../api/team-defaults.ts';
import { changeTeam, teamQueries } from '../../api/teams.ts';
import { Button, NumberField, Panel, SelectField, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { BothSides } from './both-sides.tsx';
import { defaultFields } from './default-fields.ts';
import { teamOfLostRace } from './lost-race.ts';
import { targetChoices } from './target-choices.ts';

type TaggedTeam = Team & { readonly etag: string };

/** What a new table of the team begins with. */
export function DefaultsPanel({ team, isAdmin }: { team: TaggedTeam; isAdmin: boolean }) {
  return (
    <Panel title="What new tables begin with">
      {isAdmin ? (
        <DefaultsForm team={team} />
      ) : (
        <>
          <p className="quiet">Set by an admin. The bench takes them up when you start anew.</p>
          <dl className="facts">
            {defaultFields.map(({ name, label, say }) => (
              <div key={name}>
                <dt>{label}</dt>
                <dd>{say(team.defaults)}</dd>
              </div>
            ))}
          </dl>
        </>
      )}
    </Panel>
  );
}

function DefaultsForm({ team }: { team: TaggedTeam }) {
  const [typed, setTyped] = useState(team.defaults);
  const [base, setBase] = useState(team);
  const [theirs, setTheirs] = useState<TaggedTeam | null>(null);
  const [broken, setBroken] = useState<ReadonlySet<string>>(new Set());
  const queryClient = useQueryClient();
  const toast = useToast();
  const set = (part: Partial<TeamDefaults>) => setTyped({ ...typed, ...part });
  const noteDraft = (name: string, isRight: boolean) =>
    setBroken((before) => new Set([...before].filter((one) => one !== name).concat(isRight ? [] : [name])));

  const take = (changed: TaggedTeam) => {
    setBase(changed);
    setTheirs(null);
    queryClient.setQueryData(teamQueries.detail(team.slug).queryKey, changed);
    forgetTeamDefaults(team.slug);
  };
  const changing = useSubmit(async (wanted: { defaults: TeamDefaults }) => {
    try {
      take(await changeTeam(team.slug, wanted, (theirs ?? base).etag));
    } catch (error) {
      setTheirs(teamOfLostRace(error));
      throw error;
    }
    toast({ message: 'New tables begin with these from now on.', tone: 'good' });
  }, changeTeamSchema);
  const at = (name: keyof TeamDefaults) => changing.at(`defaults.${name}`);

  return (
    <Form
      label="What new tables begin with"
      action={theirs === null ? 'Keep these' : 'Keep mine'}
      submitting={changing}
      onSubmit={() => void changing.submit({ defaults: typed })}
      fields={defaultFields.map(({ name }) => `defaults.${name}`)}
      refusedBecause={broken.size > 0 ? 'Put the marked fields right first.' : undefined}
      aside={
        theirs !== null && (
          <Button
            onPress={() => {
              setTyped(theirs.defaults);
              take(theirs);
              changing.clear();
            }}
          >
            Take theirs
          </Button>
        )
      }
    >
      <div className="field-pair">
        <NumberField
          label="Table length"
          unit="entries"
          isInteger
          {...limits.tableLength}
          allowed={`a whole number from ${limits.tableLength.min} to ${limits.tableLength.max}`}
          value={typed.length}
          onChange={(length) => set({ length })}
          onDraft={(text) => noteDraft('length', isWhole(text, 'entries', limits.tableLength))}
          problem={at('length')}
        />
        <NumberField
          label="Bit depth"
          unit="bits"
          isInteger
          {...limits.bits}
          allowed={`a whole number from ${limits.bits.min} to ${limits.bits.max}`}
          value={typed.bits}
          onChange={(bits) => set({ bits })}
          onDraft={(text) => noteDraft('bits', isWhole(text, 'bits', limits.bits))}
          problem={at('bits')}
        />
        <SelectField
          label="Export target"
          value={typed.target}
          options={targetChoices(typed.target)}
          onChange={(target) => set({ target })}
          problem={at('target')}
        />
      </div>
      <TextField
        label="Prefix of array names"
        description="Put before the name that an array gets from its wave: nf_ makes nf_fog_signal_tone."
        isCode
        autoComplete="off"
        value={typed.arrayPrefix}
        onChange={(arrayPrefix) => set({ arrayPrefix })}
        problem={at('arrayPrefix')}
      />
      <TextField
        label="Licence line"
        description="A comment at the top of each exported file, such as SPDX-License-Identifier: MIT. Empty for none."
        isCode
        autoComplete="off"
        value={typed.licenceLine}
        onChange={(licenceLine) => set({ licenceLine })}
        problem={at('licenceLine')}
      />
      {theirs !== null && <BothSides mine={typed} theirs={theirs.defaults} />}
    </Form>
  );
}

/** The number field says what is wrong itself; this keeps an old number from being sent for a wrong text. */
function isWhole(text: string, unit: string, { min, max }: { min: number; max: number }): boolean {
  const reading = parseQuantity(text, unit);
  if (reading.kind !== 'number') return false;
  const { value } = reading;
  return Number.isInteger(value) && value >= min && value <= max;
}
