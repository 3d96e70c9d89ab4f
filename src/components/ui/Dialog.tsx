import { useEffect, useId, useRef, type ReactNode } from 'react';

interface Props {
  open: boolean;
  /** The question the dialog asks. */
  title: string;
  /** For tables side by side. */
  wide?: boolean;
  onClose: () => void;
  children: ReactNode;
}

/** A modal dialog on the browser's own element: focus stays inside, Escape closes, focus returns. */
export function Dialog({ open, title, wide = false, onClose, children }: Props) {
  const element = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = element.current;
    if (!dialog) return;
    if (open && !dialog.open) {
      dialog.showModal();
      // Its buttons stand under the tables: focus on the first of them would scroll the head away.
      if (wide) document.getElementById(titleId)?.focus();
    }
    if (!open && dialog.open) dialog.close();
  }, [open, wide, titleId]);
  return (
    <dialog
      ref={element}
      className={wide ? 'dialog dialog--wide' : 'dialog'}
      aria-labelledby={titleId}
      onClose={onClose}
    >
      {open ? (
        <div className="stack">
          <h2 id={titleId} tabIndex={wide ? -1 : undefined}>
            {title}
          </h2>
          {children}
        </div>
      ) : null}
    </dialog>
  );
}
