import { useState, type FormEvent } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { Text } from '@/components/ui/text';
import { TextField } from '@/components/ui/text-field';
import { signInText } from '@/constants/texts/shell';
import { uiText } from '@/constants/texts/ui';
import { space } from '@/constants/theme';
import { confirmPassword, dismissPrompt, forgetSession, signIn, type Prompt } from '@/hooks/api';
import { useSession } from '@/hooks/use-session';
import { ApiError } from '@/shared/api-client';

/**
 * What a waiting call asks of the person, laid over the open screen, which stays as it is: to sign
 * in again, or to confirm a binding act with the password.
 */
export function SessionPrompts() {
  const { me, prompt } = useSession();
  if (!me || !prompt) return null;
  return <PasswordDialog key={prompt} prompt={prompt} email={me.user.email} />;
}

const words = {
  'sign-in-again': { title: signInText.again, body: signInText.againBody, act: signInText.act },
  'confirm-password': {
    title: signInText.confirm,
    body: signInText.confirmBody,
    act: signInText.confirmAct,
  },
} as const;

function usePasswordForm(prompt: Prompt, email: string) {
  const [password, setPassword] = useState('');
  const [fieldError, setFieldError] = useState<string>();
  const [failure, setFailure] = useState<ApiError | null>(null);
  const [busy, setBusy] = useState(false);
  const answer = async () => {
    setBusy(true);
    setFieldError(undefined);
    setFailure(null);
    try {
      if (prompt === 'sign-in-again') await signIn({ email, password });
      else await confirmPassword(password);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (error.code === 'sign-in-failed') setFieldError(signInText.wrongPassword);
      else if (error.issues.length > 0) setFieldError(error.issues[0].message);
      else setFailure(error);
    } finally {
      setBusy(false);
    }
  };
  return { password, setPassword, fieldError, failure, busy, answer };
}

function PasswordDialog({ prompt, email }: { prompt: Prompt; email: string }) {
  const form = usePasswordForm(prompt, email);
  const { title, body, act } = words[prompt];
  const submit = (event: FormEvent) => {
    event.preventDefault();
    void form.answer();
  };
  return (
    <Dialog open title={title} onClose={dismissPrompt}>
      <form className="form" onSubmit={submit}>
        <View style={styles.words}>
          <Text>{body}</Text>
          <Text tone="muted">{email}</Text>
        </View>
        <input
          className="visually-hidden"
          type="email"
          autoComplete="username"
          value={email}
          readOnly
          tabIndex={-1}
          aria-hidden
        />
        <TextField
          label={signInText.password}
          type="password"
          autoComplete="current-password"
          autoFocus
          value={form.password}
          onChangeText={form.setPassword}
          error={form.fieldError}
        />
        {form.failure ? <Notice tone="brick" title={form.failure.message} /> : null}
        <View style={styles.actions}>
          {prompt === 'sign-in-again' ? (
            <Button kind="quiet" label={signInText.someoneElse} onPress={forgetSession} />
          ) : (
            <Button kind="quiet" label={uiText.cancel} onPress={dismissPrompt} />
          )}
          <Button submit label={act} busy={form.busy} disabled={form.password === ''} />
        </View>
      </form>
    </Dialog>
  );
}

const styles = StyleSheet.create({
  words: { gap: space.xs },
  actions: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'flex-end', gap: space.sm },
});
