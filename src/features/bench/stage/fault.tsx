import { Notice } from '../../../components/index.ts';

export function Fault({ of, fault }: { of: string; fault: string | null }) {
  if (fault === null) return null;
  return (
    <Notice tone="fault">
      The {of} could not be computed: {fault}
    </Notice>
  );
}
