'use client';
import { useMutation } from '@tanstack/react-query';
import { useRef } from 'react';
import { ProblemError, send, type SendOptions } from './send';

/**
 * A write through the API. A create gets one idempotency key for the same content, kept over retries and
 * double presses, and a new one once it succeeded or the content changed.
 */
export function useSend<Answer, Body extends object = object>(
  method: 'POST' | 'PUT' | 'PATCH',
  path: string | ((body: Body) => string),
  options: Omit<SendOptions, 'idempotencyKey'> = {},
) {
  const attempt = useRef<{ key: string; content: string } | null>(null);
  return useMutation<Answer, ProblemError, Body>({
    mutationFn: async (body) => {
      const address = typeof path === 'string' ? path : path(body);
      const content = `${address} ${JSON.stringify(body)}`;
      if (attempt.current?.content !== content) attempt.current = { key: crypto.randomUUID(), content };
      const answer = await send<Answer>(method, address, body, { ...options, idempotencyKey: attempt.current.key });
      attempt.current = null;
      return answer;
    },
    retry: false,
    // Without a line the mutation would wait in silence; sent all the same, it fails at once and that is said.
    networkMode: 'always',
  });
}
