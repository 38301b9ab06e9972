import { useId, useLayoutEffect, useRef, type ReactNode } from 'react';
import { IconButton } from './button.tsx';
import { icons } from './icons.tsx';

export interface DialogProps {
  title: string;
  isOpen: boolean;
  /** Escape, the cross and a press beside the dialog ask for this. */
  onClose: () => void;
  children: ReactNode;
  /** Buttons at the foot, the main one first. */
  actions?: ReactNode;
  size?: 'medium' | 'wide';
}

/** A modal dialog on the platform's own element, which holds the focus inside and gives it back. */
export function Dialog({ title, isOpen, onClose, children, actions, size = 'medium' }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();

  useLayoutEffect(() => {
    const element = dialog.current;
    if (!isOpen || !element) return;
    element.showModal();
    return () => {
      element.close();
    };
  }, [isOpen]);

  // The element itself stays: only one that is still in the page can give the focus back.
  return (
    <dialog
      ref={dialog}
      className={`dialog dialog-${size}`}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onMouseDown={(event) => {
        if (event.target === dialog.current) onClose();
      }}
    >
      {isOpen && (
        <div className="dialog-sheet">
          <header className="dialog-head">
            <h2 id={titleId}>{title}</h2>
            <IconButton label="Close" icon={icons.close} onPress={onClose} />
          </header>
          <div className="dialog-body">{children}</div>
          {actions && <footer className="dialog-foot">{actions}</footer>}
        </div>
      )}
    </dialog>
  );
}
