import { Button } from '../../../components/index.ts';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';

/** Says where table and output have different bits, and offers those of the output. */
export function BitsFit({ bits }: { bits: number }) {
  const tableBits = useDefinition(({ table }) => table.bits);
  if (tableBits === bits) return null;
  return (
    <div className="reasons">
      <p>
        The output takes codes of {say(bits)}; the table has {say(tableBits)}.
      </p>
      <Button
        size="small"
        onPress={() =>
          changeDefinition(({ table: { levels: _gone, ...table }, ...definition }) => ({
            ...definition,
            table: { ...table, bits },
          }))
        }
      >
        Use {say(bits)}
      </Button>
    </div>
  );
}

const say = (bits: number) => `${bits} ${bits === 1 ? 'bit' : 'bits'}`;
