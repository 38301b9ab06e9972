import { useState } from 'react';
import { includesRole, type Account } from '../../../../shared/contract/index.ts';
import { Button, Notice } from '../../../components/index.ts';
import { FirstSave } from './first-save.tsx';
import { NextSave } from './next-save.tsx';
import type { SavedLink } from './saved-links.ts';
import { useSavedView } from './use-saved-links.ts';

export interface SaveFormProps {
  account: Account;
  onClose: () => void;
  onFault: (fault: string | null) => void;
}

/** The next revision of the table that the work belongs to, where one may save there; else a new table. */
export function SaveForms(props: SaveFormProps) {
  const { link } = useSavedView();
  const [isAsNew, setIsAsNew] = useState(false);
  const refusal = link && whyNotThere(props.account, link);
  if (link === null || isAsNew) return <FirstSave {...props} />;
  if (refusal !== null) {
    const isOpenElsewhere = props.account.memberships.some(({ role }) => includesRole(role, 'author'));
    return (
      <div className="form">
        {isOpenElsewhere && <Notice title="No revision can be saved there.">{refusal}</Notice>}
        <FirstSave {...props} />
      </div>
    );
  }
  return (
    <NextSave
      {...props}
      link={link}
      aside={<Button onPress={() => setIsAsNew(true)}>As a new table instead…</Button>}
    />
  );
}

/** Why a revision cannot be saved to a table; null where it can. */
function whyNotThere({ memberships }: Account, { team, teamName, title }: SavedLink): string | null {
  const membership = memberships.find(({ teamSlug }) => teamSlug === team);
  if (membership === undefined)
    return `${title} belongs to ${teamName}, and you do not. The wave can be saved as a new table.`;
  if (includesRole(membership.role, 'author')) return null;
  return `In ${membership.teamName} you are a viewer; saving takes the role author. The wave can be saved as a new table of another team.`;
}
