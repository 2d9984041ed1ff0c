import { useEffect, useRef, useState, type FormEvent } from 'react';
import { StyleSheet, View } from 'react-native';
import { z } from 'zod';
import { Button } from '@/components/ui/button';
import { Mark } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { Heading, Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { useWide } from '@/components/ui/use-wide';
import { shellText, signInText } from '@/constants/texts/shell';
import { color, font, radius, space } from '@/constants/theme';
import { useSession } from '@/hooks/use-session';
import { ApiError } from '@/shared/api-client';
import { signInSchema } from '@/shared/contracts/sessions';
import { Landscape } from './landscape';

export function SignInPage() {
  const wide = useWide();
  useEffect(() => {
    document.title = `${signInText.title} · ${shellText.product}`;
  }, []);
  return (
    <View style={[styles.page, wide && styles.pageWide]}>
      <View style={wide ? styles.pictureWide : styles.picture}>
        <Landscape />
      </View>
      <View role="main" id="content" style={[styles.column, wide && styles.columnWide]}>
        <View style={styles.brand}>
          <Mark size={40} />
          <Text style={styles.name}>{shellText.product}</Text>
        </View>
        <View style={styles.words}>
          <Heading level={1} style={styles.claim}>
            {shellText.claim}
          </Heading>
          <Text size="lead" tone="muted">
            {signInText.sentence}
          </Text>
        </View>
        <View style={styles.card}>
          <SignInForm />
        </View>
        <Text size="small" tone="muted">
          {signInText.caution}
        </Text>
      </View>
    </View>
  );
}

type Credentials = { email: string; password: string };
type FieldErrors = Partial<Record<keyof Credentials, string>>;

function useSignInForm() {
  const { signIn } = useSession();
  const [credentials, setCredentials] = useState<Credentials>({ email: '', password: '' });
  const [errors, setErrors] = useState<FieldErrors>({});
  const [failure, setFailure] = useState<ApiError | null>(null);
  const [busy, setBusy] = useState(false);
  const set = (name: keyof Credentials) => (text: string) =>
    setCredentials((before) => ({ ...before, [name]: text }));
  /** Sends what was typed; the name of the field that needs another look, if one does. */
  const submit = async (): Promise<keyof Credentials | null> => {
    setFailure(null);
    const parsed = signInSchema.safeParse(credentials);
    if (!parsed.success) {
      const { email, password } = z.flattenError(parsed.error).fieldErrors;
      setErrors({ email: email?.[0], password: password?.[0] });
      return email ? 'email' : 'password';
    }
    setErrors({});
    setBusy(true);
    try {
      await signIn(parsed.data);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (error.code !== 'sign-in-failed') setFailure(error);
      else {
        setErrors({ password: error.message });
        return 'password';
      }
    } finally {
      setBusy(false);
    }
    return null;
  };
  return { credentials, set, errors, failure, busy, submit };
}

function SignInForm() {
  const { credentials, set, errors, failure, busy, submit } = useSignInForm();
  const email = useRef<HTMLInputElement>(null);
  const password = useRef<HTMLInputElement>(null);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const field = await submit();
    if (field) ({ email, password })[field].current?.focus();
  };
  return (
    <form className="form" noValidate onSubmit={(event) => void send(event)}>
      <TextField
        ref={email}
        label={signInText.email}
        type="email"
        name="email"
        autoComplete="username"
        value={credentials.email}
        onChangeText={set('email')}
        error={errors.email}
      />
      <TextField
        ref={password}
        label={signInText.password}
        type="password"
        name="password"
        autoComplete="current-password"
        value={credentials.password}
        onChangeText={set('password')}
        error={errors.password}
      />
      {failure ? (
        <Notice
          tone={failure.code === 'too-many-attempts' ? 'ochre' : 'brick'}
          title={failure.message}
        />
      ) : null}
      <Button submit label={signInText.act} busy={busy} />
    </form>
  );
}

const styles = StyleSheet.create({
  page: { flexGrow: 1 },
  pageWide: { flexDirection: 'row-reverse', alignItems: 'stretch' },
  picture: { height: 168, backgroundColor: color.sunk },
  pictureWide: { flexGrow: 1, flexBasis: 0, backgroundColor: color.sunk },
  column: {
    width: '100%',
    maxWidth: 460,
    marginHorizontal: 'auto',
    gap: space.xl,
    padding: space.lg,
    paddingVertical: space.xl,
  },
  columnWide: {
    flexShrink: 0,
    width: 540,
    maxWidth: 540,
    marginHorizontal: 0,
    padding: 64,
    justifyContent: 'center',
  },
  brand: { flexDirection: 'row', alignItems: 'center', gap: space.md },
  name: { fontFamily: font.text, fontSize: 22, lineHeight: 28, fontWeight: '600' },
  words: { gap: space.sm },
  claim: { fontSize: 30, lineHeight: 36 },
  card: {
    padding: space.xl,
    borderRadius: radius.large,
    borderWidth: 1,
    borderColor: color.line,
    backgroundColor: color.surface,
    boxShadow: `0 8px 32px ${color.shadow}`,
  },
});
