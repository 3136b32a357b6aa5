import { forgotBody } from '@hubtack/contracts/auth/sign-in.js';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Form } from '../../components/form';
import { TextField } from '../../components/form-fields';
import { apiVoid } from '../../lib/api';
import { SignInFrame } from './sign-in-frame';

export default function ForgotPage() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  return (
    <SignInFrame title="Forgot the password">
      {sentTo === null ? (
        <Form
          schema={forgotBody}
          defaults={{ email: '' }}
          button="Send a link"
          submit={async (body) => {
            await apiVoid('POST', '/api/auth/forgot', body);
            setSentTo(body.email);
          }}
        >
          <TextField name="email" label="E-mail address" type="email" autoComplete="username" required />
        </Form>
      ) : (
        <p role="status">
          If there is an account for {sentTo}, a link is on its way. It works once, for one hour.
        </p>
      )}
      <Link to="/sign-in">Back to the sign-in</Link>
    </SignInFrame>
  );
}
