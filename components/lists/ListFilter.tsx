import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Choice, type ChoiceOption } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { Fold } from '@/components/ui/Fold';
import { space } from '@/constants/theme';
import { useDelayedCall } from '@/hooks/use-delayed-call';
import type { AddressFilter } from './use-address-filter';

export interface FilterChoice<K extends string> {
  key: K;
  label: string;
  /** What the empty choice says: "Any vehicle". */
  any: string;
  options: readonly ChoiceOption<string>[];
}

export interface ListFilterProps<K extends string> {
  /** Of the search field. */
  label: string;
  placeholder: string;
  searchKey: K;
  choices: readonly FilterChoice<K>[];
  filter: AddressFilter<K>;
}

/** Search at once; order and filters a press away, with the way back from all of them. */
export function ListFilter<K extends string>(props: ListFilterProps<K>) {
  const { choices, filter } = props;
  const narrowed = choices.filter(({ key }) => filter.values[key]).length;
  return (
    <View style={styles.all}>
      <Search {...props} />
      <Fold title={narrowed > 0 ? `Filter and order (${narrowed})` : 'Filter and order'}>
        <View style={styles.choices}>
          {choices.map(({ key, label, any, options }) => (
            <View key={key} style={styles.choice}>
              <Choice
                label={label}
                options={options}
                placeholder={any}
                value={filter.values[key] ?? ''}
                onChange={(value) => filter.set(key, value)}
              />
            </View>
          ))}
        </View>
        {filter.count > 0 ? (
          <View style={styles.row}>
            <Button label="Clear all" icon="close" kind="plain" onPress={filter.clear} />
          </View>
        ) : null}
      </Fold>
    </View>
  );
}

function Search<K extends string>({ label, placeholder, searchKey, filter }: ListFilterProps<K>) {
  const inAddress = filter.values[searchKey] ?? '';
  const [text, setText] = useState(inAddress);
  const [written, setWritten] = useState(inAddress);
  const [seen, setSeen] = useState(inAddress);
  const later = useDelayedCall();
  if (inAddress !== seen) {
    setSeen(inAddress);
    // Cleared, or changed by the way back: the field follows. What it wrote itself may be older than what stands in it.
    if (inAddress !== written) setText(inAddress);
  }
  const type = (typed: string) => {
    setText(typed);
    later(() => {
      setWritten(typed.trim());
      filter.set(searchKey, typed.trim());
    });
  };
  return (
    <Field
      label={label}
      labelHidden
      icon="search"
      placeholder={placeholder}
      value={text}
      onChangeText={type}
      inputMode="search"
    />
  );
}

const styles = StyleSheet.create({
  all: { gap: space.xs },
  choices: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  choice: { flexGrow: 1, flexBasis: 150, minWidth: 0 },
  row: { flexDirection: 'row' },
});
