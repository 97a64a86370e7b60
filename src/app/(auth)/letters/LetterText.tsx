import { Fragment } from 'react';

const ADDRESS = /(https?:\/\/[^\s<>"']+)/g;

/** Plain text as it stands, its addresses as links; nothing in it is read as markup. */
export function LetterText({ text }: { text: string }) {
  return (
    <p className="t-text mt-2 max-w-[44rem] whitespace-pre-line [overflow-wrap:anywhere]">
      {text
        .trim()
        .split(ADDRESS)
        .map((piece, at) =>
          at % 2 === 1 ? (
            <a key={at} href={piece} rel="noreferrer" className="underline">
              {piece}
            </a>
          ) : (
            <Fragment key={at}>{piece}</Fragment>
          ),
        )}
    </p>
  );
}
