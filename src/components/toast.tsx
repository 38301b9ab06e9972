import { useSyncExternalStore } from 'react';
import { Button, IconButton } from './button.tsx';
import { icons } from './icons.tsx';

export interface Toast {
  message: string;
  tone?: 'plain' | 'good' | 'fault';
  /** One thing to do about it, e.g. Undo. */
  action?: { label: string; onPress: () => void };
}

interface ShownToast extends Toast {
  id: number;
}

/** Long enough to read two lines and reach the action; a fault stays until it is put away. */
const shownMs = 7000;

let shown: readonly ShownToast[] = [];
let lastId = 0;
const listeners = new Set<() => void>();

function publish(next: readonly ShownToast[]) {
  shown = next;
  listeners.forEach((listener) => {
    listener();
  });
}

function putAway(id: number) {
  publish(shown.filter((toast) => toast.id !== id));
}

function show(toast: Toast | string): void {
  const whole = typeof toast === 'string' ? { message: toast } : toast;
  const id = ++lastId;
  publish([...shown, { ...whole, id }].slice(-3));
  if (whole.tone !== 'fault') {
    setTimeout(() => {
      putAway(id);
    }, shownMs);
  }
}

/** Returns what shows a short message at the foot of the page: `toast('Copied.')` or `toast({ message, tone, action })`. */
export function useToast(): (toast: Toast | string) => void {
  return show;
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** Mounted once, by the shell: a polite live region with the newest messages. */
export function ToastRegion() {
  const toasts = useSyncExternalStore(subscribe, () => shown);
  return (
    <div className="toast-region" role="status" aria-label="Messages">
      {toasts.map((toast) => (
        <div key={toast.id} className={`toast toast-${toast.tone ?? 'plain'}`}>
          {toast.tone === 'good' && <icons.good />}
          {toast.tone === 'fault' && <icons.fault />}
          <span className="grow">{toast.message}</span>
          {toast.action && (
            <Button
              size="small"
              variant="quiet"
              onPress={() => {
                toast.action?.onPress();
                putAway(toast.id);
              }}
            >
              {toast.action.label}
            </Button>
          )}
          <IconButton
            size="small"
            label="Put the message away"
            icon={icons.close}
            onPress={() => {
              putAway(toast.id);
            }}
          />
        </div>
      ))}
    </div>
  );
}
