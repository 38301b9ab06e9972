import { Notice } from '../../../components/index.ts';

/** What is wrong, in a notice; nothing where nothing is. */
export function Faults({ faults }: { faults: readonly string[] }) {
  if (faults.length === 0) return null;
  return (
    <Notice tone="fault" title="This cannot be brought in; nothing has been changed.">
      {faults.slice(0, 5).map((fault) => (
        <p key={fault} className="break-words">
          {fault}
        </p>
      ))}
    </Notice>
  );
}
