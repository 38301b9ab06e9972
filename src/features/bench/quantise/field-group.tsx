import type { ReactNode } from 'react';

/** Fields that are settled together, two abreast where there is room. */
export function FieldGroup({ title, children }: { title: string; children: ReactNode }) {
  return (
    <fieldset className="field-group">
      <legend>{title}</legend>
      <div className="field-pair">{children}</div>
    </fieldset>
  );
}
