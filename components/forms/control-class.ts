/**
 * The classes of a text-like control; one that was refused is framed in brick.
 * @param small for the tools above a table
 */
export function controlClass(error?: string, small = false): string {
  return `${small ? 'min-h-8 px-2 py-1' : 'min-h-10 px-2.5 py-2'} w-full rounded-sm border bg-paper text-ink placeholder:text-ink-soft disabled:bg-stone disabled:text-ink-soft ${
    error ? 'border-brick outline-1 outline-brick' : 'border-ink-soft'
  }`;
}
