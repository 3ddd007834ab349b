export default function Loading() {
  return (
    <p role="status" className="py-10 text-ink-2">
      Reading the standard stars…
    </p>
  );
}
