/** Classes of every box that takes typing or choosing. */
export const FIELD_CLASSES =
  'touch w-full rounded-edge border border-control bg-sheet px-3 py-2 text-ink placeholder:text-muted aria-invalid:border-2 aria-invalid:border-outside';
