/** A run of a printed reference. */
interface Piece {
  text: string;
  italic?: true;
  href?: string;
}

/** A printed reference: titles of what stands on a shelf in italics, the DOI or address as a link. */
export function Reference({ pieces }: { pieces: readonly Piece[] }) {
  return pieces.map(({ text, italic, href }, index) => {
    if (href) {
      return (
        <a key={index} href={href} className="break-words">
          {text}
        </a>
      );
    }
    return italic ? <cite key={index}>{text}</cite> : <span key={index}>{text}</span>;
  });
}
