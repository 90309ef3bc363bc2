/** For `dynamic`: what a dialog shows until its form has come. */
export function LoadingForm() {
  return (
    <p role="status" className="py-6 text-sm text-quiet">
      Loading…
    </p>
  );
}
