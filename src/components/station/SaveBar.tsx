import type { ReactNode } from 'react';
import { Button } from '../ui/Button';
import { Toast } from '../ui/Toast';
import type { Editor } from './useEditor';

interface Props {
  editor: Editor;
  label: string;
  /** What the toast says. */
  done: string;
  children?: ReactNode;
}

/** The one button that saves, what is not saved yet, and the word that it was. */
export function SaveBar({ editor, label, done, children }: Props) {
  return (
    <div className="row ruled">
      <Button type="submit" look="filled" large disabled={editor.saving}>
        {editor.saving ? 'Saving' : label}
      </Button>
      {children}
      {editor.unsaved && !editor.saving ? <span className="quiet">Not saved yet.</span> : null}
      {editor.saved ? <Toast message={done} onDone={editor.forgetSaved} /> : null}
    </div>
  );
}
