/** A sentence in which `code` stands between grave accents, as the document writes it. */
export function Prose({ text }: { readonly text: string }) {
  return text.split('`').map((part, index) =>
    index % 2 === 1 ? (
      <code key={index} className="text-small">
        {part}
      </code>
    ) : (
      part
    ),
  );
}
