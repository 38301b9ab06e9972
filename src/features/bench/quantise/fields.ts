import type { ReactNode } from 'react';
import type { LevelSettings, TableSettings } from '../../../../shared/contract/index.ts';
import { useFieldProblem } from '../problems/field-problem.tsx';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';

interface BoundField<Value> {
  value: Value;
  onChange: (value: Value) => void;
  problem: ReactNode;
}

/** Ties a control to a field of `table`. What is typed goes into the draft as it is; parsing judges it. */
export function useTableField<Name extends keyof TableSettings>(name: Name): BoundField<TableSettings[Name]> {
  const path = `table.${name}`;
  return {
    value: useDefinition(({ table }) => table[name]),
    onChange: (value) =>
      changeDefinition(
        (definition) => ({ ...definition, table: { ...definition.table, [name]: value } }),
        typeof value === 'number' ? path : undefined,
      ),
    problem: useFieldProblem(path),
  };
}

/** Ties a control to a field of `level`. */
export function useLevelField<Name extends keyof LevelSettings>(name: Name): BoundField<LevelSettings[Name]> {
  const path = `level.${name}`;
  return {
    value: useDefinition(({ level }) => level[name]),
    onChange: (value) =>
      changeDefinition(
        (definition) => ({ ...definition, level: { ...definition.level, [name]: value } }),
        typeof value === 'number' ? path : undefined,
      ),
    problem: useFieldProblem(path),
  };
}
