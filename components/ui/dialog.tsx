'use client';

import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button, type ButtonVariant } from './button';

/**
 * A question that must be answered before going on, in the browser's own modal dialog (focus stays inside, Escape closes).
 * Only for what cannot be undone.
 */
export function Dialog({
  open,
  onClose,
  title,
  children,
}: {
  open: boolean;
  onClose: () => void;
  title: ReactNode;
  children: ReactNode;
}) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    if (open) dialog.current?.showModal();
    else dialog.current?.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onClose={onClose}
      className="m-auto w-[min(36rem,calc(100vw-2rem))] border border-line bg-paper p-5.5 text-ink backdrop:bg-ink/50"
    >
      <h2 id={titleId} className="text-lg">
        {title}
      </h2>
      {children}
    </dialog>
  );
}

/**
 * Asks once more before an act that cannot be undone.
 * @param consequences what will hold afterwards
 * @param confirmLabel the act, worded as itself ("Stop dosing for good"), never "OK"
 */
export function ConfirmDialog({
  open,
  onClose,
  onConfirm,
  title,
  consequences,
  confirmLabel,
  variant = 'danger',
  pending = false,
}: {
  open: boolean;
  onClose: () => void;
  onConfirm: () => void;
  title: ReactNode;
  consequences: ReactNode;
  confirmLabel: string;
  variant?: ButtonVariant;
  pending?: boolean;
}) {
  return (
    <Dialog open={open} onClose={onClose} title={title}>
      <div className="mt-2 text-ink-soft">{consequences}</div>
      <div className="mt-5 flex flex-wrap gap-3">
        <Button variant={variant} pending={pending} onClick={onConfirm}>
          {confirmLabel}
        </Button>
        <Button variant="quiet" onClick={onClose}>
          Go back
        </Button>
      </div>
    </Dialog>
  );
}
