/**
 * A text mail as it was sent, with the addresses that lead into this installation as links. Any other address stays
 * text.
 * @param url the installation's own address
 */
export function TextWithLinks({ text, url }: { text: string; url: string }) {
  const pieces = text.split(/(https?:\/\/[^\s<>"]+)/);
  return (
    <pre
      tabIndex={0}
      aria-label="The mail as text"
      role="region"
      className="frame-scroll border border-line bg-stone px-4 py-4 font-mono text-xs [font-variant-ligatures:none] md:px-6"
    >
      {pieces.map((piece, index) =>
        piece.startsWith(`${url}/`) ? (
          <a key={index} href={piece}>
            {piece}
          </a>
        ) : (
          piece
        ),
      )}
    </pre>
  );
}
