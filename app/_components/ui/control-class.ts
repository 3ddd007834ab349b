/** Frame, padding and invalid state shared by everything one types into. */
export const controlClass =
  'block w-full min-w-0 rounded-tag border border-edge bg-sheet px-2 py-1 text-table text-ink focus-visible:outline-2 focus-visible:outline-offset-0 disabled:border-rule disabled:bg-sunk disabled:text-ink-2 aria-invalid:border-2 aria-invalid:border-bad min-h-8';
