import { Panel } from '../../components/index.ts';
import { useCommenting } from './comment-context.ts';
import { CommentForm, CommentList } from './thread.tsx';

/** What was said of the revision as a whole, and of settings that stand nowhere else on the page. */
export function CommentsPanel({ shownElsewhere }: { shownElsewhere: ReadonlySet<string> }) {
  const commenting = useCommenting();
  if (commenting === null) return null;
  const { at, comments, mayWrite } = commenting;
  const here = comments.filter(({ path }) => path === null || !shownElsewhere.has(path));
  const elsewhere = comments.length - here.length;
  return (
    <Panel title="Comments">
      <CommentList comments={here} label="Comments on the revision" hasPaths />
      {here.length === 0 && <p className="quiet">Nobody has commented on the revision as a whole.</p>}
      {elsewhere > 0 && (
        <p className="quiet">
          {elsewhere === 1 ? 'One more stands' : `${elsewhere} more stand`} beside the settings they are
          about.
        </p>
      )}
      {mayWrite ? (
        <CommentForm at={at} path={null} />
      ) : (
        <p className="quiet">Commenting takes the role author.</p>
      )}
    </Panel>
  );
}
