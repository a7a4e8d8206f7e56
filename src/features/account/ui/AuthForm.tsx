import { useState, type FormEvent, type ReactNode } from 'react';
import { Banner, Button, Checkbox, TextInput } from '@/components/ui';

interface Answer {
  readonly message?: string;
  readonly code?: string;
}

/** Words for what better-auth answers; anything unknown is said as it is. */
const WORDS: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: 'This address and password do not belong together.',
  EMAIL_NOT_VERIFIED:
    'This address has not been confirmed yet. We have sent the link again; please read your mail.',
  PASSWORD_TOO_SHORT: 'Use at least 10 characters for the password.',
  INVALID_TOKEN: 'This link has been used or is too old. Ask for a new one.',
  INVALID_EMAIL: 'This is not an e-mail address.',
};

async function post(path: string, body: Record<string, unknown>): Promise<string | null> {
  try {
    const response = await fetch(`/api/auth/${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
    });
    if (response.ok) return null;
    if (response.status === 429) return 'Too many tries. Please wait a minute.';
    const answer = (await response.json().catch(() => ({}))) as Answer;
    return WORDS[answer.code ?? ''] ?? answer.message ?? 'That did not work. Please try again.';
  } catch {
    return 'The server could not be reached. Please try again.';
  }
}

/** A form around one call: its error in words, one submit at a time. */
function Form({
  submit,
  label,
  children,
}: {
  submit: (data: Record<string, string>) => Promise<string | null>;
  label: string;
  children: ReactNode;
}) {
  const [error, setError] = useState<string | null>(null);
  const [pending, setPending] = useState(false);
  const onSubmit = (event: FormEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (pending) return;
    const data = Object.fromEntries(
      [...new FormData(event.currentTarget)].map(([key, value]) => [key, String(value)]),
    );
    setPending(true);
    void submit(data).then((problem) => {
      setError(problem);
      if (problem) setPending(false);
    });
  };
  return (
    <form className="col auth-form" method="post" onSubmit={onSubmit}>
      {error && (
        <Banner tone="error" live>
          {error}
        </Banner>
      )}
      {children}
      <Button type="submit" kind="primary" pending={pending}>
        {label}
      </Button>
    </form>
  );
}

export function SignInForm({ next }: { next: string }) {
  const [keep, setKeep] = useState(true);
  return (
    <Form
      label="Sign in"
      submit={async ({ email = '', password = '' }) => {
        const problem = await post('sign-in/email', { email, password, rememberMe: keep, callbackURL: next });
        if (!problem) location.assign(next);
        return problem;
      }}
    >
      <TextInput label="E-mail" name="email" type="email" autoComplete="username" required />
      <TextInput label="Password" name="password" type="password" autoComplete="current-password" required />
      <div className="row sp">
        <Checkbox label="Keep me signed in for 14 days" checked={keep} onChange={setKeep} />
        <a className="small" href="/forgot">
          Forgotten it?
        </a>
      </div>
    </Form>
  );
}

export function DemoPeople({
  people,
  password,
  next,
}: {
  people: { role: string; name: string; email: string }[];
  password: string;
  next: string;
}) {
  const [pending, setPending] = useState<string | null>(null);
  return (
    <ul className="demo-people">
      {people.map((person) => (
        <li key={person.email}>
          <Button
            size="small"
            pending={pending === person.email}
            onClick={() => {
              setPending(person.email);
              void post('sign-in/email', { email: person.email, password }).then((problem) => {
                if (problem) setPending(null);
                else location.assign(next);
              });
            }}
          >
            {person.name}, {person.role}
          </Button>
        </li>
      ))}
    </ul>
  );
}

export function SignUpForm({ next, email = '' }: { next: string; email?: string }) {
  return (
    <Form
      label="Make an account"
      submit={async ({ name = '', email: address = '', password = '' }) => {
        const problem = await post('sign-up/email', { name, email: address, password, callbackURL: next });
        if (!problem) location.assign(`/check-mail?email=${encodeURIComponent(address)}`);
        return problem;
      }}
    >
      <TextInput label="Your name" name="name" autoComplete="name" required maxLength={80} />
      <TextInput
        label="E-mail"
        name="email"
        type="email"
        autoComplete="username"
        required
        defaultValue={email}
      />
      <TextInput
        label="Password"
        name="password"
        type="password"
        autoComplete="new-password"
        required
        minLength={10}
        hint="At least 10 characters"
      />
    </Form>
  );
}

export function ForgotForm() {
  return (
    <Form
      label="Send the link"
      submit={async ({ email = '' }) => {
        const problem = await post('request-password-reset', { email, redirectTo: '/reset' });
        if (!problem) location.assign(`/check-mail?email=${encodeURIComponent(email)}`);
        return problem;
      }}
    >
      <TextInput label="E-mail" name="email" type="email" autoComplete="username" required />
    </Form>
  );
}

export function ResetForm({ token }: { token: string }) {
  return (
    <Form
      label="Use this password"
      submit={async ({ password = '' }) => {
        const problem = await post('reset-password', { newPassword: password, token });
        if (!problem) location.assign('/sign-in?reset=1');
        return problem;
      }}
    >
      <TextInput
        label="New password"
        name="password"
        type="password"
        autoComplete="new-password"
        required
        minLength={10}
        hint="At least 10 characters"
      />
    </Form>
  );
}
