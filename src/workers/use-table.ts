import { useEffect, useState } from 'react';
import { sayProblem, type Definition } from '../../shared/contract/index.ts';
import { createEngine } from './engine-client.ts';
import type { EngineReply, TableAnswer } from './engine-messages.ts';

type Built = { table: TableAnswer } | { fault: string };

/** Builds one definition in a worker of its own; `null` until it is there, and where there is none to build. */
export function useTable(definition: Definition | null): Built | null {
  const [built, setBuilt] = useState<{ of: Definition; result: Built } | null>(null);
  useEffect(() => {
    if (definition === null) return;
    const engine = createEngine((reply) => setBuilt({ of: definition, result: resultOf(reply) }));
    engine.submit(definition);
    return () => engine.stop();
  }, [definition]);
  return built !== null && built.of === definition ? built.result : null;
}

function resultOf(reply: EngineReply): Built {
  switch (reply.kind) {
    case 'built':
      return { table: reply.table };
    case 'refused':
      return { fault: `This wave cannot be built. ${sayProblem(reply.problems[0])}.` };
    case 'failed':
      return { fault: reply.message };
  }
}
