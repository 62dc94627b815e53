'use client';
import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { send } from '../api/send';
import { useToast } from '../ui/toast';

/** Opening a new report marks it as read; the server knows whether this person's reading counts. */
export function MarkRead({ id }: { id: string }) {
  const router = useRouter();
  const { say } = useToast();
  useEffect(() => {
    send('POST', `/api/symptoms/${id}/read`, {}).then(
      () => router.refresh(),
      (error: Error) => say({ kind: 'needs', word: 'Not marked as read.', text: error.message }),
    );
  }, [id, router, say]);
  return null;
}
