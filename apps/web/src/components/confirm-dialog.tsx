import { Button, Dialog, DialogBody, DialogFooter } from '@blueprintjs/core';
import type { ReactNode } from 'react';
import { ProblemNotice } from './problem-notice';

interface ConfirmDialogProps {
  title: string;
  children: ReactNode;
  confirmLabel: string;
  cancelLabel?: string;
  isOpen: boolean;
  isBusy?: boolean;
  error?: unknown;
  onConfirm: () => void;
  onCancel: () => void;
}

/** Asks before something that can't be undone with one key. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { title, children, confirmLabel, cancelLabel = 'Keep it as it is', isOpen, isBusy = false, error, onConfirm, onCancel } = props;
  return (
    <Dialog title={title} isOpen={isOpen} onClose={onCancel} className="dialog-narrow" canOutsideClickClose={!isBusy}>
      <DialogBody>
        {children}
        {error !== undefined && error !== null && <ProblemNotice error={error} />}
      </DialogBody>
      <DialogFooter
        actions={
          <>
            <Button onClick={onCancel} disabled={isBusy}>
              {cancelLabel}
            </Button>
            <Button intent="danger" onClick={onConfirm} loading={isBusy}>
              {confirmLabel}
            </Button>
          </>
        }
      />
    </Dialog>
  );
}
