/** The canonical text of the previewed job: exactly these bytes are hashed. */
export function HashedText({ text }: { text: string | null }) {
  return (
    <section aria-labelledby="what-is-hashed" className="pt-1">
      <h2 id="what-is-hashed" className="font-medium text-h3 italic">
        What is hashed
      </h2>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a scrolled region must be reachable by keys */}
      <pre tabIndex={0} className="mt-1 max-h-44 overflow-auto whitespace-pre-wrap break-all bg-field p-2.5 text-least">
        {text ?? '…'}
      </pre>
    </section>
  );
}
