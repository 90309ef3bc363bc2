/** A moment in words, in the time zone of whoever reads it: the server's guess is replaced in the browser. */
export function Moment({ iso }: { iso: string }) {
  return (
    <time dateTime={iso} suppressHydrationWarning>
      {new Date(iso).toLocaleString('en-GB', { dateStyle: 'medium', timeStyle: 'short' })}
    </time>
  );
}
