/** What a form shows of itself: what was typed, and what is wrong with a field. */
export interface FormView {
  value: (name: string, fallback?: string) => string;
  error: (name: string) => string | undefined;
}
