import { useState } from 'react';
import { View } from 'react-native';
import { Strip, type StripProps } from '@/components/strip/Strip';

/** A strip as wide as its place. */
export function StripBox(props: Omit<StripProps, 'width'>) {
  const [width, setWidth] = useState(0);
  return (
    <View
      style={{ height: props.height, overflow: 'hidden' }}
      onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}
    >
      <Strip {...props} width={width} />
    </View>
  );
}
