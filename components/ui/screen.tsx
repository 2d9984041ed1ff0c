import { createContext, use, useEffect, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { uiText } from '@/constants/texts/ui';
import { color, space } from '@/constants/theme';
import { Mark } from './icon';
import { Heading, Text } from './text';
import { useWide } from './use-wide';

export type ScreenProps = {
  title: string;
  /** One quiet line above the heading: where this belongs. */
  overline?: ReactNode;
  subtitle?: ReactNode;
  /** Buttons at the right of the heading. */
  actions?: ReactNode;
  /** Widest measure of the content on a wide window. */
  measure?: number;
  children: ReactNode;
};

/** What the frame puts at the right of the heading in a narrow window. */
export const ScreenCorner = createContext<ReactNode>(null);

/** A page: the main landmark with its heading, which also names the browser's tab. */
export function Screen(props: ScreenProps) {
  const { title, overline, subtitle, actions, measure = 1180, children } = props;
  const wide = useWide();
  const corner = use(ScreenCorner);
  useEffect(() => {
    document.title = `${title} · ${uiText.product}`;
  }, [title]);
  const heading = <Heading level={1}>{unbroken(title)}</Heading>;
  const below = <Quiet>{subtitle}</Quiet>;
  return (
    <View role="main" id="content" tabIndex={-1} style={[styles.main, wide && styles.wide]}>
      <View style={[styles.column, { maxWidth: measure }]}>
        {wide ? (
          <View style={styles.line}>
            <View style={styles.words}>
              <Quiet small>{overline}</Quiet>
              {heading}
              {below}
            </View>
            {actions ? <View style={styles.actions}>{actions}</View> : null}
          </View>
        ) : (
          <View style={styles.stack}>
            <View style={styles.line}>
              <Mark size={30} />
              <View style={styles.words}>{heading}</View>
              {corner}
            </View>
            <Quiet small>{overline}</Quiet>
            {below}
            {actions ? <View style={styles.actions}>{actions}</View> : null}
          </View>
        )}
        {children}
      </View>
    </View>
  );
}

/** A title whose dates and numbers of records stay on one line. */
const unbroken = (title: string) =>
  title.split(/(\S*-\d\S*)/).map((part, index) =>
    index % 2 === 1 ? (
      <span key={index} className="unbroken">
        {part}
      </span>
    ) : (
      part
    ),
  );

/** A quiet line when it is a text, else whatever it is. */
function Quiet({ small = false, children }: { small?: boolean; children: ReactNode }) {
  if (typeof children !== 'string') return children;
  return (
    <Text size={small ? 'small' : 'body'} tone="muted">
      {children}
    </Text>
  );
}

const styles = StyleSheet.create({
  main: { flexGrow: 1, padding: space.md, paddingBottom: space.xl, backgroundColor: color.ground },
  wide: { padding: space.xl, paddingTop: space.xl },
  column: { width: '100%', gap: space.lg },
  stack: { gap: space.sm },
  line: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.md },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 120, gap: 2 },
  actions: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.sm },
});
