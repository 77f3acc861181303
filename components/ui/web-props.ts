/** Attributes that the web needs and React Native's types do not know. */
export interface WebProps {
  'aria-level'?: number;
  'aria-invalid'?: boolean;
  'aria-required'?: boolean;
  'aria-describedby'?: string;
  'aria-errormessage'?: string;
  'aria-current'?: 'page' | 'step' | 'true';
  'aria-pressed'?: boolean;
  'aria-controls'?: string;
  'aria-haspopup'?: 'dialog' | 'menu' | 'listbox';
  'aria-roledescription'?: string;
  autoComplete?: string;
  enterKeyHint?: string;
  href?: string;
  hrefAttrs?: { target?: string; rel?: string; download?: string | boolean };
  onKeyDown?: (event: { key: string; shiftKey: boolean; preventDefault: () => void }) => void;
  onMouseEnter?: () => void;
  onMouseLeave?: () => void;
  onTouchStart?: () => void;
  onTouchEnd?: () => void;
  tabIndex?: 0 | -1;
}

/** Passes web attributes through to react-native-web: `<View {...web({ 'aria-level': 2 })} />`. */
export const web = (props: WebProps): object => props;
