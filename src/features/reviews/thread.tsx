import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { createCommentSchema, type Comment } from '../../../shared/contract/index.ts';
import { newKey } from '../../api/new-key.ts';
import { addComment, reviewQueries, type RevisionAt } from '../../api/reviews.ts';
import { Moment, TextField } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useKeptText } from '../../forms/use-kept-text.ts';
import { useSubmit } from '../../forms/use-submit.ts';
import { nameOfSetting } from '../../settings/index.ts';

interface CommentListProps {
  comments: readonly Comment[];
  /** Spoken name. */
  label: string;
  /** Whether each says which setting it is about. */
  hasPaths?: boolean;
}

/** Comments, oldest first. */
export function CommentList({ comments, label, hasPaths = false }: CommentListProps) {
  if (comments.length === 0) return null;
  return (
    <ol className="comment-list" aria-label={label}>
      {comments.map(({ id, by, at, text, path }) => (
        <li key={id} className="comment">
          <p className="quiet">
            <strong>{by.name}</strong>, <Moment at={at} />
            {hasPaths && path !== null && `, on ${nameOfSetting(path)}`}
          </p>
          <p className="comment-text">{text}</p>
        </li>
      ))}
    </ol>
  );
}

interface CommentFormProps {
  at: RevisionAt;
  /** The setting that is commented on; null for the whole revision. */
  path: string | null;
  onDone?: () => void;
}

/** Writes one comment. What was typed stays until it is sent. */
export function CommentForm({ at, path, onDone }: CommentFormProps) {
  const [text, setText] = useKeptText(`comment ${at.team} ${at.table} ${at.number} ${path ?? ''}`);
  const [key, setKey] = useState(newKey);
  const queryClient = useQueryClient();
  const adding = useSubmit(async (body: { text: string; path: string | null }) => {
    await addComment(at, body, key);
    setText('');
    setKey(newKey());
    await queryClient.invalidateQueries({ queryKey: reviewQueries.comments(at).queryKey });
    onDone?.();
  }, createCommentSchema);
  const what = path === null ? 'the revision' : nameOfSetting(path);
  return (
    <Form
      label={`Comment on ${what}`}
      action="Add the comment"
      variant="plain"
      submitting={adding}
      onSubmit={() => void adding.submit({ text, path })}
      fields={['text']}
    >
      <TextField
        label={path === null ? 'Comment' : `Comment on ${what}`}
        multiline
        value={text}
        onChange={(next) => {
          setText(next);
          setKey(newKey());
        }}
        problem={adding.at('text')}
      />
    </Form>
  );
}
