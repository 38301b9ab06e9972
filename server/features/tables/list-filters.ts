import { sql, type SQL } from 'drizzle-orm';
import type { MySqlColumn } from 'drizzle-orm/mysql-core';
import { limits, showValue, type TablesQuery } from '../../../shared/contract/index.ts';
import { tableTerms, waveTables } from '../../db/schema/index.ts';
import { Problem } from '../../http/problem.ts';
import { signatureOf, tagTerm, wordsOf } from './search-terms.ts';

/** The tables that a list is about. */
export interface Scope {
  readonly teamId: number;
  readonly isArchived: boolean;
}

export interface Filter {
  /** Index entries of the tables that pass, one or more each: a `from` and its `where`. */
  readonly entries: SQL;
  /** The tables that pass, read by these entries, for a `from`. */
  readonly source: SQL;
  /** What a row must show in the index that is walked; rules most of the others out. */
  readonly quickTest: SQL;
  /** What a row that passed must show on a closer look, where one is needed. */
  readonly closeTest?: SQL;
}

/**
 * What a table must pass: every word begins a word of its title or tags, the tag is one of its tags, the state its own.
 *
 * @throws {Problem} `validation` (422) where more words are looked for than a request may
 */
export function filtersOf(scope: Scope, { search = '', tag, state }: TablesQuery): Filter[] {
  const words = wordsOf(search);
  if (words.length > limits.searchWords) {
    throw new Problem('validation', {
      errors: [
        {
          path: 'search',
          value: showValue(search),
          allowed: `at most ${limits.searchWords} different words`,
        },
      ],
    });
  }
  return [
    // A word has no character that LIKE takes as more than itself.
    ...words.map((word) => termFilter(scope, word, sql`like ${`${word}%`}`)),
    ...(tag === undefined ? [] : [termFilter(scope, tagTerm(tag), sql`= ${tagTerm(tag)}`)]),
    ...(state === undefined ? [] : [stateFilter(scope, state)]),
  ];
}

function termFilter(scope: Scope, term: string, matches: SQL): Filter {
  const { low, high } = signatureOf([term]);
  const entries = sql`${tableTerms} where ${tableTerms.teamId} = ${scope.teamId}
    and ${tableTerms.isArchived} = ${scope.isArchived} and ${tableTerms.term} ${matches}`;
  return {
    entries,
    source: tablesOf(scope, tableTerms.tableId, entries),
    quickTest: sql`${waveTables.signatureLow} & ${low} = ${low} and ${waveTables.signatureHigh} & ${high} = ${high}`,
    // The limit keeps the optimiser from turning the test of one row into a list of all that pass.
    closeTest: sql`(select 1 from ${tableTerms} force index (table_terms_table)
        where ${tableTerms.teamId} = ${scope.teamId} and ${tableTerms.tableId} = ${waveTables.id}
        and ${tableTerms.term} ${matches} limit 1) = 1`,
  };
}

function stateFilter(scope: Scope, state: string): Filter {
  const entries = sql`${waveTables} force index (wave_tables_state) where ${waveTables.teamId} = ${scope.teamId}
    and ${waveTables.isArchived} = ${scope.isArchived} and ${waveTables.state} = ${state}`;
  return {
    entries,
    source: tablesOf(scope, waveTables.id, entries),
    quickTest: sql`${waveTables.state} = ${state}`,
  };
}

const tablesOf = ({ teamId }: Scope, id: MySqlColumn, entries: SQL) =>
  sql`(select distinct ${id} as id from ${entries}) as found
    straight_join ${waveTables} on ${waveTables.teamId} = ${teamId} and ${waveTables.id} = found.id`;
