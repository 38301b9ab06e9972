import { Refusal } from '../../shared/contract/index.ts';
import { lsbOf } from '../../shared/quantiser/index.ts';
import { tabulate } from '../../shared/tabulate.ts';
import type { EngineJob, EngineMessage, TableAnswer } from './engine-messages.ts';

addEventListener('message', ({ data }: MessageEvent<EngineJob>) => {
  const reply = replyTo(data);
  postMessage(reply, { transfer: reply.kind === 'built' ? arraysOf(reply.table) : [] });
});

function replyTo({ id, definition }: EngineJob): EngineMessage {
  try {
    const { definition: _kept, ...table } = tabulate(definition);
    const lsb = lsbOf(definition.table);
    const errorLsb = table.values.map((value, k) => (value - table.cycle[k]) / lsb);
    return { id, kind: 'built', table: { ...table, lsb, errorLsb } };
  } catch (error) {
    if (error instanceof Refusal) return { id, kind: 'refused', problems: error.problems };
    return { id, kind: 'failed', message: `The engine could not build the table: ${String(error)}.` };
  }
}

function arraysOf({
  cycle,
  values,
  codes,
  stored,
  errorLsb,
  spectrum,
}: Omit<TableAnswer, 'definition'>): Transferable[] {
  const { amplitudes, intended, added } = spectrum;
  return [cycle, values, codes, stored, errorLsb, amplitudes, intended, added].map(({ buffer }) => buffer);
}
