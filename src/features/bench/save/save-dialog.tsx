import { Link } from 'react-router-dom';
import { useAccountState } from '../../../api/account-state.ts';
import { askToSignIn } from '../../../api/sign-in-again.ts';
import { Button, Dialog } from '../../../components/index.ts';
import { NewTeamForm } from '../../../forms/new-team-form.tsx';
import { WithAccount } from '../../../forms/with-account.tsx';
import { paths } from '../../../paths.ts';
import { SaveForms } from './save-forms.tsx';
import { useSavedView } from './use-saved-links.ts';

interface SaveDialogProps {
  onClose: () => void;
  /** What keeps the save from getting through, in words; null once nothing does. */
  onFault: (fault: string | null) => void;
}

/** The way into the library: an account, a team, then a name and a note. */
export function SaveDialog({ onClose, onFault }: SaveDialogProps) {
  const known = useAccountState();
  const { link } = useSavedView();
  return (
    <Dialog title={link === null ? 'Save to a library' : 'Save a revision'} isOpen onClose={onClose}>
      {known.kind === 'nobody' ? (
        <NeedsAccount onClose={onClose} />
      ) : (
        <WithAccount why="Saving to a library needs an account.">
          {(account) =>
            account.memberships.length === 0 ? (
              <NeedsTeam />
            ) : (
              <SaveForms account={account} onClose={onClose} onFault={onFault} />
            )
          }
        </WithAccount>
      )}
    </Dialog>
  );
}

function NeedsAccount({ onClose }: { onClose: () => void }) {
  return (
    <div className="form">
      <p>
        A team’s library keeps every revision of a table, to be found again, heard, exported and shared. It
        needs an account. What is on the bench stays there meanwhile, also after sign-up and verification.
      </p>
      <div className="form-actions">
        <Button variant="primary" onPress={() => void askToSignIn()}>
          Sign in
        </Button>
        <Link to={paths.signUp} className="button button-plain" onClick={onClose}>
          Make an account
        </Link>
      </div>
    </div>
  );
}

function NeedsTeam() {
  return (
    <div className="form">
      <p>
        Tables are saved for a team. Make one now; you can be its only member. If you have been invited to
        one, open the invitation in your mail instead.
      </p>
      <NewTeamForm onMade={() => undefined} />
    </div>
  );
}
