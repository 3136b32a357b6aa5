import { Button } from '@fluentui/react-components';
import { signInBody } from '@hubtack/contracts/auth/sign-in.js';
import { useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import { Form } from '../../components/form';
import { TextField } from '../../components/form-fields';
import { useSigningIn, useSignInHints } from '../../lib/session';
import { SignInFrame } from './sign-in-frame';

export default function SignInPage() {
  const signIn = useSigningIn('/api/auth/sign-in');
  const { data: hints } = useSignInHints();
  const [chosen, setChosen] = useState('');
  const navigate = useNavigate();
  const { state } = useLocation() as { state: { from?: string } | null };
  return (
    <SignInFrame title="Sign in">
      <Form
        key={chosen}
        schema={signInBody}
        defaults={{ email: chosen, password: chosen ? (hints?.password ?? '') : '' }}
        button="Sign in"
        submit={async (body) => {
          await signIn.mutateAsync(body);
          await navigate(state?.from ?? '/', { replace: true });
        }}
      >
        <TextField name="email" label="E-mail address" type="email" autoComplete="username" required />
        <TextField
          name="password"
          label="Password"
          type="password"
          autoComplete="current-password"
          required
        />
      </Form>
      <Link to="/forgot">Forgot the password?</Link>
      {hints && hints.accounts.length > 0 && (
        <section className="sign-in-demo">
          <h2>This is the demo</h2>
          Choose who you are; the password is filled in.
          <ul>
            {hints.accounts.map(({ email, role }) => (
              <li key={email}>
                <Button onClick={() => setChosen(email)}>
                  <span>{email}</span>
                  <span>{role}</span>
                </Button>
              </li>
            ))}
          </ul>
        </section>
      )}
    </SignInFrame>
  );
}
