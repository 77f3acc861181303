import { StyleSheet } from 'react-native';
import { touchTarget } from '@/constants/theme';
import { Text } from './Text';
import { web } from './web-props';

export interface FileLinkProps {
  href: string;
  /** "CSV". */
  label: string;
  /** What is downloaded: "Health report". */
  of: string;
}

/** A file to download. The browser fetches it by itself, and shows how far it is in its own way. */
export const FileLink = ({ href, label, of }: FileLinkProps) => (
  <Text
    variant="label"
    strong
    tone="petrol"
    role="link"
    aria-label={`${of} as ${label}`}
    style={styles.link}
    {...web({ href, hrefAttrs: { download: true } })}
  >
    {label}
  </Text>
);

const styles = StyleSheet.create({ link: { paddingVertical: (touchTarget - 20) / 2 } });
