import type { TeamDefaults } from '../../../shared/contract/index.ts';
import { defaultFields } from './default-fields.ts';

/** What one typed beside what somebody else has kept meanwhile. */
export function BothSides({ mine, theirs }: { mine: TeamDefaults; theirs: TeamDefaults }) {
  const differing = defaultFields.filter(({ name }) => mine[name] !== theirs[name]);
  return (
    <section className="slab slab-saffron" aria-label="Both sides">
      <div className="min-w-0 grow">
        <p role="alert">
          <strong>Somebody else has kept other defaults meanwhile.</strong>{' '}
          {differing.length === 0
            ? 'They are the same as yours.'
            : 'Keep yours or take theirs; until then nothing of yours is lost.'}
        </p>
        {differing.length > 0 && (
          <table className="ledger both-sides">
            <thead>
              <tr>
                <th scope="col">Setting</th>
                <th scope="col">Mine</th>
                <th scope="col">Theirs</th>
              </tr>
            </thead>
            <tbody>
              {differing.map(({ name, label, say }) => (
                <tr key={name}>
                  <th scope="row">{label}</th>
                  <td>{say(mine)}</td>
                  <td>{say(theirs)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
      </div>
    </section>
  );
}
