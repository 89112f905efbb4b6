/** The first stop of the keyboard on every page: past the header, to the work. */
export function SkipLink() {
  return (
    <a
      href="#work"
      className="sr-only focus:not-sr-only focus:absolute focus:left-2 focus:top-2 focus:z-50 focus:bg-paper focus:px-3 focus:py-2 focus:text-water-deep focus:underline"
    >
      Skip to the work
    </a>
  );
}
