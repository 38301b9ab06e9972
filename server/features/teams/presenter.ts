import {
  teamDefaultsSchema,
  teamLimits,
  type Member,
  type Role,
  type Team,
} from '../../../shared/contract/index.ts';
import type { MemberRow, TeamRow } from './queries.ts';

export const presentTeam = (
  team: Pick<TeamRow, 'slug' | 'name' | 'defaults' | 'twoPersonRule' | 'version'>,
  myRole: Role,
  tables: number,
): Team => ({
  slug: team.slug,
  name: team.name,
  myRole,
  defaults: teamDefaultsSchema.parse(team.defaults),
  twoPersonRule: team.twoPersonRule,
  usage: { tables, tablesAtMost: teamLimits.tables },
  version: team.version,
});

export const presentMember = ({ since, ...row }: MemberRow): Member => ({
  ...row,
  since: since.toISOString(),
});
