import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { messageOf } from '@/components/ui/ErrorState';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { useDisplayUnits, usePatchPreferences } from '@/hooks/preferences';
import {
  CHOSEN_QUANTITIES,
  displayUnit,
  QUANTITY_NAMES,
  unitsOf,
  type ChosenQuantity,
} from '@/shared/display-units';
import { defaultUnit } from '@/shared/units';

/** The units that values are shown in, for this person on every device. */
export function UnitsCard() {
  const units = useDisplayUnits();
  const patch = usePatchPreferences();
  const toast = useToast();
  const save = async (next: typeof units) => {
    try {
      await patch.mutateAsync({ units: next });
    } catch (error) {
      toast({ message: `The units are as before: ${messageOf(error)}` });
    }
  };
  const choose = (quantity: ChosenQuantity, symbol: string) => {
    // What is not named follows the default, also where a field has a better one of its own.
    const usual = symbol === defaultUnit(quantity).symbol;
    void save({ ...units, [quantity]: usual ? undefined : symbol });
  };
  return (
    <Card title="Units">
      <Text variant="label" tone="soft">
        How values are shown to you, on every device. Fields take any unit of their kind: type it after the
        number. Exports and the API stay in SI.
      </Text>
      <View style={styles.grid}>
        {CHOSEN_QUANTITIES.map((quantity) => (
          <View key={quantity} style={styles.cell}>
            <Choice
              label={QUANTITY_NAMES[quantity]}
              options={unitsOf(quantity).map(({ symbol }) => ({ value: symbol, label: symbol }))}
              value={displayUnit(quantity, units).symbol}
              onChange={(symbol) => choose(quantity, symbol)}
            />
          </View>
        ))}
      </View>
      {Object.values(units).some(Boolean) ? (
        <View style={styles.row}>
          <Button label="Back to the usual units" icon="undo" kind="plain" onPress={() => void save({})} />
        </View>
      ) : null}
    </Card>
  );
}

const styles = StyleSheet.create({
  grid: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  cell: { flexGrow: 1, flexBasis: 240, minWidth: 0 },
  row: { flexDirection: 'row' },
});
