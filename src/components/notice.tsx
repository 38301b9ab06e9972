import type { ReactNode } from 'react';
import { icons } from './icons.tsx';

const signs = { good: icons.good, fault: icons.fault, plain: icons.question } as const;

export interface NoticeProps {
  /** `fault` is announced at once, the others politely. */
  tone?: keyof typeof signs;
  title?: string;
  children?: ReactNode;
  actions?: ReactNode;
}

/** A few words with a sign: what went well, what went wrong, what to know. */
export function Notice({ tone = 'plain', title, children, actions }: NoticeProps) {
  const Sign = signs[tone];
  const slab = { good: 'slab slab-moss', fault: 'slab slab-oxide', plain: 'slab' }[tone];
  return (
    <div className={slab} role={tone === 'fault' ? 'alert' : 'status'}>
      <Sign className="slab-sign" />
      <div className="notice-words">
        {title && <strong>{title}</strong>}
        {children && <div>{children}</div>}
        {actions && <div className="notice-actions">{actions}</div>}
      </div>
    </div>
  );
}
