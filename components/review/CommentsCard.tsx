import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { useCan } from '@/hooks/session';
import { useAddComment, useComments, type VersionRef } from '@/hooks/versions';
import type { VersionComment } from '@/shared/contracts/version-reviews';
import { FIELD_GROUPS } from '@/shared/parameters/parameter-field';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';

/** What people say of a version, or of one of its parameters. Comments stay. */
export function CommentsCard({ of }: { of: VersionRef }) {
  const comments = useComments(of);
  const mayWrite = useCan('comment:write');
  return (
    <Card title="Comments">
      {comments.isError ? (
        <ErrorState
          title="The comments could not be loaded"
          error={comments.error}
          onRetry={() => void comments.refetch()}
        />
      ) : null}
      {comments.data?.items.length === 0 ? (
        <Text variant="label" tone="soft">
          Nothing has been said of it yet.
        </Text>
      ) : null}
      {comments.data?.items.map((comment, at) => (
        <Comment key={comment.id} comment={comment} first={at === 0} />
      ))}
      {mayWrite ? <Write of={of} /> : null}
    </Card>
  );
}

function Comment({ comment, first }: { comment: VersionComment; first: boolean }) {
  const { palette } = useTheme();
  return (
    <View style={[styles.comment, first ? null : { borderTopWidth: hairline, borderTopColor: palette.rule }]}>
      <Figures
        variant="label"
        tone="soft"
      >{`${comment.createdBy}, ${formatMoment(comment.createdAt)}`}</Figures>
      {comment.label ? (
        <Text variant="label" strong tone="petrol">
          {comment.label}
        </Text>
      ) : null}
      <Text>{comment.text}</Text>
    </View>
  );
}

const WHOLE = '';

function Write({ of }: { of: VersionRef }) {
  const [text, setText] = useState('');
  const [path, setPath] = useState(WHOLE);
  const add = useAddComment(of);
  const submit = async () => {
    try {
      await add.mutateAsync({ text: text.trim(), ...(path === WHOLE ? {} : { path }) });
      setText('');
      setPath(WHOLE);
    } catch {
      // shown below from the mutation's own state; what was written stays
    }
  };
  return (
    <View style={styles.write}>
      <Field label="Comment" value={text} onChangeText={setText} multiline />
      <Choice
        label="About"
        shape="select"
        placeholder="the whole version"
        value={path}
        options={ABOUT}
        onChange={setPath}
      />
      {add.isError ? (
        <Notice tone="vermilion" urgent title="Not sent">
          {messageOf(add.error)}
        </Notice>
      ) : null}
      <View style={styles.buttons}>
        <Button
          label="Comment"
          disabled={text.trim() === ''}
          reason="Write something first."
          busy={add.isPending}
          onPress={() => void submit()}
        />
      </View>
    </View>
  );
}

const ABOUT = PARAMETER_LIST.map(({ path, group, label }) => ({
  value: path,
  label: `${FIELD_GROUPS[group]}: ${label}`,
}));

const styles = StyleSheet.create({
  comment: { paddingVertical: space.s, gap: 2 },
  write: { gap: space.m, paddingTop: space.s },
  buttons: { flexDirection: 'row' },
});
