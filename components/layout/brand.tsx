/** The mark: stairs that go down to the water, with the name. */
export function Brand() {
  return (
    <span className="flex items-center gap-2.5 font-serif text-[1.1875rem]">
      <svg width="30" height="26" viewBox="0 0 30 26" aria-hidden="true" className="shrink-0">
        <path d="M1 2h7v5h5v5h5v5h5v5h6" className="fill-none stroke-ink" strokeWidth="2.4" />
        <path d="M1 24h28" className="fill-none stroke-water" strokeWidth="3" />
      </svg>
      Stepwell
    </span>
  );
}
