import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Message } from '@/components/ui/states';
import { TextField } from '@/components/ui/text-field';
import { sayError } from '@/lib/http';
import { useSignIn } from '../api/session';

/** E-mail and password; says under the field what is missing, and above the form why the server refused. */
export function SignInForm({ onSignedIn }: { onSignedIn: () => void }) {
  const [email, setEmail] = useState('');
  const [password, setPassword] = useState('');
  const [tried, setTried] = useState(false);
  const signIn = useSignIn();

  const missing = {
    email: tried && email.trim() === '' ? 'Enter your e-mail address' : undefined,
    password: tried && password === '' ? 'Enter your password' : undefined,
  };

  return (
    <form
      noValidate
      className="grid gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        setTried(true);
        if (email.trim() === '' || password === '') return;
        signIn.mutate({ email: email.trim(), password }, { onSuccess: onSignedIn });
      }}
    >
      {signIn.isError && (
        <Message tone="crayon" role="alert">
          {sayError(signIn.error)}
        </Message>
      )}
      <TextField
        label="E-mail"
        type="email"
        name="email"
        autoComplete="username"
        value={email}
        error={missing.email}
        onChange={(event) => setEmail(event.target.value)}
      />
      <TextField
        label="Password"
        type="password"
        name="password"
        autoComplete="current-password"
        value={password}
        error={missing.password}
        onChange={(event) => setPassword(event.target.value)}
      />
      <Button type="submit" look="main" disabled={signIn.isPending}>
        {signIn.isPending ? 'Signing in…' : 'Sign in'}
      </Button>
    </form>
  );
}
