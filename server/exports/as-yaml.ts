/** A version as YAML 1.2, written so that readers of YAML 1.1 take the same from it. */
import { Document, type ScalarTag } from 'yaml';
import type { ExportDocument } from '@/shared/contracts/exports';

/** `1e-7` is text to a reader of YAML 1.1: numbers with an exponent get a decimal point. */
const NUMBER: ScalarTag = {
  identify: (value) => typeof value === 'number',
  default: true,
  tag: 'tag:yaml.org,2002:float',
  test: /^[-+]?(?:\d+\.\d*|\.\d+|\d+)(?:[eE][-+]?\d+)?$/,
  resolve: Number,
  stringify: ({ value }) => {
    const text = Object.is(value, -0) ? '-0.0' : String(value);
    return text.includes('.') ? text : text.replace('e', '.0e');
  },
};

export function asYaml(document: ExportDocument): string {
  const yaml = new Document(document, {
    version: '1.2',
    compat: 'yaml-1.1',
    customTags: (tags) => [NUMBER, ...tags],
    aliasDuplicateObjects: false,
  });
  yaml.commentBefore = [document.notice, ...document.cautions].map((line) => ` ${line}`).join('\n');
  return yaml.toString({ lineWidth: 0 });
}
