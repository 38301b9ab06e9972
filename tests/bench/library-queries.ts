import { sortDirections, tableSorts } from '../../shared/contract/index.ts';
import { commonWord, states, tags, vocabulary } from './library-seed.ts';
import { pick, pickByRank, type Random } from './random.ts';

/**
 * What one member asks of the list: each filter drawn for itself, so that all pairs come up; words as often as they
 * are used in titles, whole or only begun; now and then a number that few titles have, or a state that no table is in.
 */
export function randomListQuery(random: Random): string {
  const query = new URLSearchParams({
    sort: pick(random, tableSorts),
    direction: pick(random, sortDirections),
  });
  const search = randomSearch(random);
  if (search !== '') query.set('search', search);
  if (random() < 0.25) query.set('tag', pickByRank(random, tags));
  if (random() < 0.25) query.set('state', pick(random, [...states, 'withdrawn']));
  if (random() < 0.1) query.set('archived', 'yes');
  return query.toString();
}

function randomSearch(random: Random): string {
  const kind = random();
  if (kind < 0.3) return '';
  if (kind < 0.5) return begun(random, commonWord);
  if (kind < 0.8) return begun(random, pickByRank(random, vocabulary));
  if (kind < 0.9) return String(Math.floor(100_000 * random()));
  return `${commonWord} ${begun(random, pickByRank(random, vocabulary))}`;
}

/** The word, or in half of all cases no more of it than somebody has typed. */
const begun = (random: Random, word: string) =>
  random() < 0.5 ? word : word.slice(0, 1 + Math.floor(random() * word.length));
