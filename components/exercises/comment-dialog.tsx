'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { useEditing } from '@/components/hooks/use-editing';
import { commentOn } from '@/components/hooks/use-exercises';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { TextAreaField } from '@/components/ui/text-area-field';
import type { SubmissionView } from '@/lib/schemas/exercises';

interface CommentDialogProps {
  collaboration: string;
  exerciseKey: string;
  who: string;
  submission: SubmissionView;
  onClose(): void;
  onSaved(): void;
}

/** An answer to one submission; it may be written anew, what was handed in may not. */
export function CommentDialog(props: CommentDialogProps) {
  const { collaboration, exerciseKey, who, submission, onClose, onSaved } = props;
  const [comment, setComment] = useState(submission.comment ?? '');
  const editing = useEditing(submission.comment ?? '');
  const { perform, isBusy, problem } = useAction();
  const save = () =>
    perform(() =>
      editing.attempt(comment, async (opened) => {
        await commentOn(collaboration, exerciseKey, submission.id, opened, comment);
        onSaved();
      }),
    );
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={`Answer ${who}`}
      actions={
        <>
          <Button
            variant="primary"
            onClick={save}
            isBusy={isBusy}
            disabledReason={comment.trim() === '' ? 'Write something first.' : undefined}
          >
            Save the answer
          </Button>
          <Button onClick={onClose}>Back</Button>
        </>
      }
    >
      <p className="mb-3 max-w-[60ch] text-ink2">
        {submission.run.analysis}, run {submission.run.number}: {submission.difference} against the
        reference.
      </p>
      <TextAreaField
        label="Answer"
        rows={5}
        value={comment}
        maxLength={4000}
        error={problem}
        onChange={(event) => setComment(event.target.value)}
      />
      <div className="mt-3 empty:hidden">
        <ChangedNotice
          editing={editing}
          words={(text) => ({ Answer: text })}
          onTake={setComment}
          onKeep={() => void save()}
        />
      </div>
    </Dialog>
  );
}
