import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { noticeKinds, type NoticeChoices } from '../../../shared/contract/index.ts';
import { changeNotices, noticeQueries } from '../../api/notices.ts';
import { asProblem } from '../../api/problem-error.ts';
import { Panel, SwitchField, Waiting, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { noticeWords } from './notice-words.ts';

/** What comes by mail; each switch is in effect at once. */
export function NoticesPanel() {
  const { data: choices, error, refetch } = useQuery(noticeQueries.choices());
  const queryClient = useQueryClient();
  const toast = useToast();
  const changing = useMutation({
    mutationFn: changeNotices,
    onSuccess: (now) => queryClient.setQueryData(noticeQueries.choices().queryKey, now),
    onError: (fault) => toast({ message: fault.message, tone: 'fault' }),
  });
  // What was switched shows so at once, and as it was where it could not be kept.
  const shown: NoticeChoices | undefined = choices && {
    ...choices,
    ...(changing.isPending ? changing.variables : {}),
  };
  return (
    <Panel title="Notices">
      <p className="quiet">By mail to your address, for all your teams; never about what you do yourself.</p>
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {shown === undefined && !error && <Waiting>Reading your choices…</Waiting>}
      {shown !== undefined && (
        <div className="notice-choices">
          {noticeKinds.map((kind) => (
            <SwitchField
              key={kind}
              label={noticeWords[kind].label}
              description={noticeWords[kind].when}
              isOn={shown[kind]}
              isDisabled={changing.isPending}
              onChange={(isOn) => changing.mutate({ [kind]: isOn })}
            />
          ))}
        </div>
      )}
    </Panel>
  );
}
