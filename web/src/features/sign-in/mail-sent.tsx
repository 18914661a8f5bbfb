import { LinkButton } from '../../ui/link-button.tsx';
import { Door } from './door.tsx';

/** After something that goes on in a mail: where to look, and what if nothing comes. */
export function MailSent({ to, says }: { to: string; says: string }) {
  return (
    <Door title="Look into your mail">
      <p role="status">{says}</p>
      <p className="mt-3">
        <span className="lettering block">Sent to</span>
        <b className="wrap-break-word">{to}</b>
      </p>
      <p className="mt-3 text-mute">
        Nothing there after some minutes? Look among the unwanted mail, and whether the address is written right.
      </p>
      <LinkButton className="mt-5" to="/sign-in">
        Back to sign in
      </LinkButton>
    </Door>
  );
}
