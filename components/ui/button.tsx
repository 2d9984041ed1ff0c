import { Icon, type IconName } from './icon';
import { Link } from './link';

export type ButtonKind = 'primary' | 'secondary' | 'quiet' | 'danger';

export type ButtonProps = {
  label: string;
  kind?: ButtonKind;
  icon?: IconName;
  /** The act is under way: the button keeps its place and takes no second press. */
  busy?: boolean;
  disabled?: boolean;
  /** With an address the button is a link. */
  href?: string;
  onPress?: () => void;
  /** Submits the form that the button stands in. */
  submit?: boolean;
  /** Shares the width of its row. */
  grow?: boolean;
};

export function Button(props: ButtonProps) {
  const { label, kind = 'primary', icon, busy = false, disabled = false, href, grow } = props;
  const className = `button button-${kind}${grow ? ' button-grow' : ''}`;
  const face = (
    <>
      {icon ? <Icon name={icon} size={20} /> : null}
      <span>{label}</span>
      {busy ? <span className="button-busy" aria-hidden /> : null}
    </>
  );
  if (href !== undefined)
    return (
      <Link href={href} className={className}>
        {face}
      </Link>
    );
  return (
    <button
      type={props.submit ? 'submit' : 'button'}
      className={className}
      disabled={disabled}
      aria-busy={busy}
      aria-disabled={busy || undefined}
      onClick={(event) => {
        if (busy) event.preventDefault();
        else props.onPress?.();
      }}
    >
      {face}
    </button>
  );
}
