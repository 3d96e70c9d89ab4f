/** What a component needs to know of a form that was sent: what was typed, and what is wrong with it. */
export interface FormView {
  problems: { fieldId?: string | undefined; message: string }[];
  value: (name: string, fallback?: string) => string;
  error: (name: string) => string | undefined;
}
