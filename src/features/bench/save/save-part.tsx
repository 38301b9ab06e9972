import './save.css';
import { lazy, Suspense, useCallback, useEffect, useState } from 'react';
import { Link } from 'react-router-dom';
import { useAccount } from '../../../api/account-state.ts';
import { Button, icons, useKeyGroup, useToast, type KeyGroup } from '../../../components/index.ts';
import { tablePath } from '../../../paths.ts';
import { theBench } from '../state/use-bench.ts';
import type { SavedLink } from './saved-links.ts';
import { useSavedView } from './use-saved-links.ts';

const SaveDialog = lazy(async () => ({ default: (await import('./save-dialog.tsx')).SaveDialog }));

const command = /Mac|iP/.test(navigator.platform) ? '⌘' : 'Ctrl';
const saveKeys: KeyGroup = {
  title: 'Saving',
  keys: [{ caps: [command, 'S'], does: 'Save the wave on the bench' }],
};

/** Saves the wave to a team's library, and says how far it has got there. */
export function SavePart() {
  const { link } = useSavedView();
  const isRefused = useIsViewer(link);
  const [isOpen, setIsOpen] = useState(false);
  const [fault, setFault] = useState<string | null>(null);
  const toast = useToast();
  const open = useCallback(() => {
    if (theBench().getState().problems.length === 0) setIsOpen(true);
    else
      toast({
        message: 'Only a wave that builds can be saved. Put the marked fields right first.',
        tone: 'fault',
      });
  }, [toast]);
  useSaveKey(open);
  return (
    <>
      <Button variant="primary" icon={icons.save} onPress={open}>
        {link === null || isRefused ? 'Save' : 'Save revision'}
      </Button>
      <Standing fault={fault} onTryAgain={open} />
      {isOpen && (
        <Suspense fallback={null}>
          <SaveDialog onClose={() => setIsOpen(false)} onFault={setFault} />
        </Suspense>
      )}
    </>
  );
}

/** Where the work stands with the library. */
function Standing({ fault, onTryAgain }: { fault: string | null; onTryAgain: () => void }) {
  const { link, isChanged } = useSavedView();
  const isRefused = useIsViewer(link);
  return (
    <div role="status" className="save-standing">
      {fault !== null && (
        <p className="save-fault">
          <icons.fault width="16" height="16" />
          <span>
            Not saved yet: {fault} The wave and what you typed are kept in this browser.{' '}
            <button type="button" className="link" onClick={onTryAgain}>
              Go on saving
            </button>
          </span>
        </p>
      )}
      {fault === null && link !== null && (
        <p className="quiet">
          {isChanged ? 'Changed since' : 'This is'} revision {link.revision} of{' '}
          <Link to={tablePath(link.team, link.table)} className="link">
            {link.title}
          </Link>
          , {link.teamName}
          {isRefused && '. As a viewer there you can listen and export, but save no revision'}
        </p>
      )}
    </div>
  );
}

/** Whether the one who is signed in may save no revision of the work's table. */
function useIsViewer(link: SavedLink | null): boolean {
  const account = useAccount();
  return account?.memberships.find(({ teamSlug }) => teamSlug === link?.team)?.role === 'viewer';
}

function useSaveKey(save: () => void): void {
  useKeyGroup(saveKeys);
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== 's' || event.shiftKey || event.altKey) return;
      if (!event.ctrlKey && !event.metaKey) return;
      event.preventDefault();
      if (document.querySelector('dialog[open]') === null) save();
    };
    addEventListener('keydown', press);
    return () => removeEventListener('keydown', press);
  }, [save]);
}
