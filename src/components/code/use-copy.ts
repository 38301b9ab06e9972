import { copyText } from '../copy-text.ts';
import { useToast } from '../toast.tsx';

/** Copies text and tells so, or tells how to do it by hand. */
export function useCopy(): (text: string, what: string) => Promise<void> {
  const toast = useToast();
  return async (text, what) => {
    if (await copyText(text)) toast({ message: `${what} copied.`, tone: 'good' });
    else
      toast({
        message: 'The browser does not let this page copy. Select the text and copy it by hand.',
        tone: 'fault',
      });
  };
}
