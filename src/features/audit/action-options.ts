import { auditActions, type AuditAction } from '../../../shared/contract/index.ts';
import type { SelectOption } from '../../components/index.ts';

/** What a kind of action is called: the part before the dot, and each action after it. */
const kindWords: Readonly<Record<string, string>> = {
  team: 'Team',
  member: 'Members',
  invitation: 'Invitations',
  table: 'Tables',
  revision: 'Revisions',
  comment: 'Comments',
  original: 'Originals',
  limits: 'Limits',
  board: 'Boards',
};

const actionWords: Readonly<Record<AuditAction, string>> = {
  'team.created': 'made',
  'team.changed': 'changed',
  'member.invited': 'invited',
  'member.joined': 'joined',
  'member.role-changed': 'role changed',
  'member.left': 'left',
  'member.removed': 'removed',
  'invitation.withdrawn': 'withdrawn',
  'table.created': 'saved anew',
  'table.changed': 'renamed or tagged',
  'table.duplicated': 'duplicated',
  'table.archived': 'archived',
  'table.restored': 'restored',
  'revision.saved': 'saved',
  'revision.submitted': 'submitted',
  'revision.vetted': 'vetted',
  'revision.returned': 'returned',
  'revision.withdrawn': 'withdrawn',
  'comment.added': 'added',
  'original.kept': 'kept',
  'original.removed': 'removed',
  'limits.created': 'set',
  'limits.changed': 'changed',
  'limits.deleted': 'taken away',
  'board.created': 'saved anew',
  'board.revised': 'revised',
  'board.copied': 'copied',
  'board.retired': 'retired',
  'board.restored': 'restored',
};

const kindOf = (action: string) => action.slice(0, action.indexOf('.'));

/** Each kind as a whole where it has several actions, and each action. */
export const actionOptions: readonly SelectOption[] = [...new Set(auditActions.map(kindOf))].flatMap(
  (kind) => {
    const actions = auditActions.filter((action) => kindOf(action) === kind);
    const word = kindWords[kind] ?? kind;
    const each = actions.map((action) => ({ value: action, label: `${word}: ${actionWords[action]}` }));
    return actions.length > 1 ? [{ value: `${kind}.`, label: `${word}: all` }, ...each] : each;
  },
);
