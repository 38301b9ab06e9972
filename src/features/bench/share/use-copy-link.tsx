import { useCallback, useState, type ReactNode } from 'react';
import { copyText } from '../../../components/copy-text.ts';
import { Dialog, TextField, useToast } from '../../../components/index.ts';
import type { Wave } from '../state/wave.ts';
import { linkTo, sayCopied } from './copy-link.ts';

/** Copies a wave's link and tells so; where the browser forbids copying, a dialog holds the link for copying by hand. */
export function useCopyLink(): { copyLink: (wave: Wave) => void; linkDialog: ReactNode } {
  const toast = useToast();
  const [byHand, setByHand] = useState<string | null>(null);
  const copyLink = useCallback(
    (wave: Wave) => {
      void linkTo(wave).then(async (link) => {
        if (await copyText(link)) toast({ message: sayCopied(link), tone: 'good' });
        else setByHand(link);
      });
    },
    [toast],
  );
  const linkDialog = (
    <Dialog title="Copy the link" isOpen={byHand !== null} onClose={() => setByHand(null)}>
      <TextField
        label="Link to the wave, read-only"
        description="The browser does not let this page copy. Select the text and copy it by hand."
        value={byHand ?? ''}
        onChange={() => undefined}
        isReadOnly
        isCode
        multiline
      />
    </Dialog>
  );
  return { copyLink, linkDialog };
}
