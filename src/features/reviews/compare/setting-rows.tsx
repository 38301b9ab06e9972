import { useState } from 'react';
import { Button } from '../../../components/index.ts';
import { useCommenting } from '../comment-context.ts';
import { CommentForm, CommentList } from '../thread.tsx';

export interface ShownSetting {
  readonly path: string;
  readonly name: string;
  /** One value, or the earlier and the later one. */
  readonly values: readonly string[];
}

interface SettingRowsProps {
  caption: string;
  /** Heads of the columns of values. */
  heads: readonly string[];
  settings: readonly ShownSetting[];
}

/** So many are shown at first: a drawn wave may have thousands. */
const shownAtFirst = 30;

/** Settings in words, each with the comments about it. */
export function SettingRows({ caption, heads, settings }: SettingRowsProps) {
  const [isWhole, setIsWhole] = useState(false);
  const commented = new Set(useCommenting()?.comments.map(({ path }) => path));
  const shown = isWhole
    ? settings
    : settings.filter(({ path }, index) => index < shownAtFirst || commented.has(path));
  const hidden = settings.length - shown.length;
  return (
    <div className="space-y-2">
      <table className="ledger setting-rows">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            <th scope="col">Setting</th>
            {heads.map((head) => (
              <th key={head} scope="col">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {shown.map((setting) => (
            <SettingRow key={setting.path} setting={setting} columns={heads.length + 1} />
          ))}
        </tbody>
      </table>
      {hidden > 0 && (
        <Button size="small" onPress={() => setIsWhole(true)}>
          Show {hidden.toLocaleString('en')} more
        </Button>
      )}
    </div>
  );
}

function SettingRow({
  setting: { path, name, values },
  columns,
}: {
  setting: ShownSetting;
  columns: number;
}) {
  const [isWriting, setIsWriting] = useState(false);
  const commenting = useCommenting();
  const comments = commenting?.comments.filter((comment) => comment.path === path) ?? [];
  const hasThread = comments.length > 0 || isWriting;
  return (
    <>
      <tr data-with-thread={hasThread || undefined}>
        <th scope="row">
          {name}{' '}
          {commenting?.mayWrite && (
            <Button
              size="small"
              variant="quiet"
              aria-expanded={isWriting}
              aria-label={`Comment on ${name}`}
              onPress={() => setIsWriting(!isWriting)}
            >
              Comment
            </Button>
          )}
        </th>
        {values.map((value, index) => (
          <td key={index} className={index === 1 ? 'setting-after' : undefined}>
            {value}
          </td>
        ))}
      </tr>
      {commenting !== null && hasThread && (
        <tr>
          <td colSpan={columns} className="setting-thread">
            <CommentList comments={comments} label={`Comments on ${name}`} />
            {isWriting && <CommentForm at={commenting.at} path={path} onDone={() => setIsWriting(false)} />}
          </td>
        </tr>
      )}
    </>
  );
}
