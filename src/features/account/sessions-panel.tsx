import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { endOtherSessions, endSession, sessionQueries } from '../../api/account.ts';
import { asProblem } from '../../api/problem-error.ts';
import { Button, Moment, Panel, Waiting, useToast } from '../../components/index.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { sayClient } from './say-client.ts';

/** Where one is signed in. */
export function SessionsPanel() {
  const { data: sessions, error, refetch } = useQuery(sessionQueries.list());
  const queryClient = useQueryClient();
  const toast = useToast();
  const ending = useMutation({
    mutationFn: (id: string | null) => (id === null ? endOtherSessions() : endSession(id)),
    onSuccess: (_, id) => toast(id === null ? 'All other sessions have ended.' : 'The session has ended.'),
    onError: (fault) => toast({ message: fault.message, tone: 'fault' }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: sessionQueries.all }),
  });
  const others = sessions?.filter(({ isThisOne }) => !isThisOne).length ?? 0;
  return (
    <Panel
      title="Sessions"
      actions={
        <Button
          size="small"
          isDisabled={others === 0 || ending.isPending}
          disabledReason={others === 0 ? 'There is no other session' : 'This is under way'}
          onPress={() => ending.mutate(null)}
        >
          End all others
        </Button>
      }
    >
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {sessions === undefined && !error && <Waiting>Reading the sessions…</Waiting>}
      {sessions !== undefined && (
        <div className="ledger-scroll">
          <table className="ledger">
            <caption>
              Browsers that are signed in to this account. A session ends by itself after 30 days.
            </caption>
            <thead>
              <tr>
                <th scope="col">Browser</th>
                <th scope="col">Signed in</th>
                <th scope="col">Last seen</th>
                <th scope="col">
                  <span className="sr-only">Actions</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {sessions.map(({ id, client, createdAt, lastSeenAt, isThisOne }) => (
                <tr key={id}>
                  <td>
                    <span className="session-client" title={client}>
                      {sayClient(client)}
                    </span>
                  </td>
                  <td>
                    <Moment at={createdAt} />
                  </td>
                  <td>
                    <Moment at={lastSeenAt} />
                  </td>
                  <td>
                    {isThisOne ? (
                      <strong>This one</strong>
                    ) : (
                      <Button
                        size="small"
                        isDisabled={ending.isPending}
                        aria-label={`End the session of ${sayClient(client)}`}
                        onPress={() => ending.mutate(id)}
                      >
                        End
                      </Button>
                    )}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </Panel>
  );
}
