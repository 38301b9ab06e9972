import { Link } from 'react-router-dom';
import { linksIn } from './links-in.ts';

/** A mail's text, as text. Links to this application lead there, whichever of this machine's names they are made with. */
export function MailText({ text }: { text: string }) {
  return (
    <p className="mail-text">
      {linksIn(text, location.port).map((part, index) =>
        part.path === undefined ? (
          <span key={index}>{part.text}</span>
        ) : (
          <Link key={index} to={part.path} className="link">
            {part.text}
          </Link>
        ),
      )}
    </p>
  );
}
