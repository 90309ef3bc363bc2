const address = /(https?:\/\/[^\s<>"]+)/;

/** Plain text whose web addresses can be followed. */
export function LinkedText({ text }: { text: string }) {
  return (
    <p className="text-sm wrap-anywhere whitespace-pre-wrap">
      {text
        .trim()
        .split(address)
        .map((part, index) =>
          // Split with one group gives text and addresses in turn.
          index % 2 === 1 ? (
            <a key={index} href={part} className="text-indigo underline">
              {part}
            </a>
          ) : (
            part
          ),
        )}
    </p>
  );
}
