import { proofsOf, type TargetProof } from '../../../../shared/firmware/index.ts';

/** What the proofs of a target have found: by which tools, on what, and how many cycles it takes. */
export function ProofStatus({ targetId }: { targetId: string }) {
  const proofs = proofsOf(targetId);
  const tools = [...new Set(proofs.flatMap(({ tool }) => tool.split(/[,;] /)))];
  const hasFigures = proofs.some((proof) => figureOf(proof) !== '');
  return (
    <details className="proof-status">
      <summary>
        Proven: {proofs.length} cases, by {tools.join(', ')}
      </summary>
      <p className="figure-note">
        Found anew by each run of <code>npm run proof</code>; a figure that differs from these fails it.
        {hasFigures && ' Handlers count the 2 cycles of the simulator’s response; the data sheets have 4.'}
      </p>
      <div className="proof-table" role="region" aria-label="Proofs" tabIndex={0}>
        <table>
          <thead>
            <tr>
              <th scope="col">Case</th>
              <th scope="col">Tool</th>
              <th scope="col">Proven</th>
              {hasFigures && <th scope="col">Cost</th>}
            </tr>
          </thead>
          <tbody>
            {proofs.map((proof) => (
              <tr key={`${proof.case} ${proof.tool}`}>
                <th scope="row">{proof.case}</th>
                <td>{proof.tool}</td>
                <td>{proof.proven}</td>
                {hasFigures && <td className="font-mono">{figureOf(proof)}</td>}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}

function figureOf(proof: TargetProof): string {
  const { cyclesPerWord, handlerCycles, instructions, tickCycles } = proof;
  if (handlerCycles !== undefined) return `handler ${handlerCycles} cycles${entryOf(proof)}`;
  if (cyclesPerWord !== undefined) return `${cyclesPerWord} cycles a word`;
  if (tickCycles !== undefined) return `a tick at most ${tickCycles} cycles`;
  return instructions === undefined ? '' : `${instructions} instructions`;
}

const entryOf = ({ entryVariesBy, entryVariesWithCalls }: TargetProof) =>
  entryVariesBy === undefined
    ? ''
    : `, its entry varies by ${entryVariesBy} (with calls in main ${entryVariesWithCalls})`;
