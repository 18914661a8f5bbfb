import { useQueryClient } from '@tanstack/react-query';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import type { Me, SignIn } from '../../../api/contract/sign-in.ts';
import { Door } from '../features/sign-in/door.tsx';
import { nextAddress } from '../features/sign-in/next-address.ts';
import { SignInForm } from '../features/sign-in/sign-in-form.tsx';
import { startOver } from '../features/sign-in/start-over.ts';
import { api } from '../lib/api.ts';

export function Component() {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const location = useLocation();
  const said = (location.state as { says?: string } | null)?.says;
  const signIn = async (input: SignIn) => {
    const me = await api.post<Me>('/api/sign-in', input);
    startOver(queries, me);
    await navigate(nextAddress(location.search), { replace: true });
  };
  return (
    <Door
      title="Sign in"
      lead="For photographers and their assistants."
      foot={
        <>
          <p>
            <Link to="/reset-password" className="inline-block py-1.5 underline underline-offset-4">
              Forgotten your password?
            </Link>
          </p>
          <p>
            No studio yet?{' '}
            <Link to="/sign-up" className="inline-block py-1.5 underline underline-offset-4">
              Sign up
            </Link>
          </p>
          <p className="text-mute">Were you sent pictures? Open the link in the e-mail; you need no password.</p>
        </>
      }
    >
      {said ? (
        <p role="status" className="mb-4 border border-verdigris px-4 py-3 font-bold text-verdigris">
          {said}
        </p>
      ) : null}
      <SignInForm onSignIn={signIn} />
    </Door>
  );
}
