import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, useState } from 'react';
import { Controller, useForm } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
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

function useSignInForm() {
  const { signIn } = useSession();
  const [failure, setFailure] = useState<ApiError | null>(null);
  const form = useForm<Credentials>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: '', password: '' },
  });
  const submit = form.handleSubmit(async (credentials) => {
    setFailure(null);
    try {
      await signIn(credentials);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      if (error.code === 'sign-in-failed') {
        form.setError('password', { message: error.message }, { shouldFocus: true });
      } else setFailure(error);
    }
  });
  return { form, failure, submit };
}

function SignInForm() {
  const { form, failure, submit } = useSignInForm();
  const { errors, isSubmitting } = form.formState;
  return (
    <form className="form" noValidate onSubmit={(event) => void submit(event)}>
      <Controller
        control={form.control}
        name="email"
        render={({ field }) => (
          <TextField
            {...field}
            onChangeText={field.onChange}
            label={signInText.email}
            type="email"
            autoComplete="username"
            error={errors.email?.message}
          />
        )}
      />
      <Controller
        control={form.control}
        name="password"
        render={({ field }) => (
          <TextField
            {...field}
            onChangeText={field.onChange}
            label={signInText.password}
            type="password"
            autoComplete="current-password"
            error={errors.password?.message}
          />
        )}
      />
      {failure ? (
        <Notice
          tone={failure.code === 'too-many-attempts' ? 'ochre' : 'brick'}
          title={failure.message}
        />
      ) : null}
      <Button submit label={signInText.act} busy={isSubmitting} />
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
