import {
  firstManagerBody,
  linkInfo,
  passwordBody,
  type FirstManagerBody,
  type PasswordBody,
} from '@hubtack/contracts/auth/sign-in.js';
import { queryOptions, useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { Form } from '../../components/form';
import { TextField } from '../../components/form-fields';
import { Loading } from '../../components/query-states';
import { api } from '../../lib/api';
import { useSigningIn } from '../../lib/session';
import { SignInFrame } from './sign-in-frame';

const linkQuery = (token: string) =>
  queryOptions({
    queryKey: ['link', token],
    retry: false,
    queryFn: () => api(linkInfo, 'GET', `/api/auth/link/${encodeURIComponent(token)}`),
  });

const passwordHint = 'At least 12 characters. A few words are good.';

/** Where an invitation, a reset mail or the first start leads: choose a password and be signed in. */
export default function LinkPage() {
  const { token = '' } = useParams();
  const navigate = useNavigate();
  const { data: link, error } = useQuery(linkQuery(token));
  const setPassword = useSigningIn<PasswordBody>('/api/auth/password');
  const makeFirst = useSigningIn<FirstManagerBody>('/api/auth/first-manager');
  if (error)
    return (
      <SignInFrame title="This link does not work">
        <p role="alert">{error.message}</p>
        <Link to="/sign-in">To the sign-in</Link>
      </SignInFrame>
    );
  if (!link) return <Loading what="the link" />;
  if (link.purpose === 'firstManager')
    return (
      <SignInFrame title="Make the first manager">
        <Form
          schema={firstManagerBody}
          defaults={{ token, name: '', email: '', password: '' }}
          button="Make the account"
          submit={async (body) => {
            await makeFirst.mutateAsync(body);
            await navigate('/settings', { replace: true });
          }}
        >
          <TextField name="name" label="Name" autoComplete="name" required />
          <TextField name="email" label="E-mail address" type="email" autoComplete="username" required />
          <TextField
            name="password"
            label="Password"
            type="password"
            autoComplete="new-password"
            hint={passwordHint}
            required
          />
        </Form>
      </SignInFrame>
    );
  return (
    <SignInFrame title={link.purpose === 'invite' ? 'Welcome: choose a password' : 'Choose a new password'}>
      <p>For {link.email}</p>
      <Form
        schema={passwordBody}
        defaults={{ token, password: '' }}
        button="Set the password"
        submit={async (body) => {
          await setPassword.mutateAsync(body);
          await navigate('/', { replace: true });
        }}
      >
        <TextField
          name="password"
          label="Password"
          type="password"
          autoComplete="new-password"
          hint={passwordHint}
          required
        />
      </Form>
    </SignInFrame>
  );
}
