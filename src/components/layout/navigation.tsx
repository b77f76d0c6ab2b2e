import { Link } from 'react-router-dom';

export type NavWord = { readonly word: string; readonly to: string; readonly isCurrent: boolean };

export function NavWords(props: {
  words: readonly NavWord[];
  onFollow?: (() => void) | undefined;
}) {
  return (
    <ul>
      {props.words.map((entry) => (
        <li key={entry.to}>
          <Link
            to={entry.to}
            aria-current={entry.isCurrent ? 'page' : undefined}
            onClick={props.onFollow}
          >
            <span data-word={entry.word}>{entry.word}</span>
          </Link>
        </li>
      ))}
    </ul>
  );
}
