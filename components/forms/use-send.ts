'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { callApi, type Problem } from './api-client';

/** Sends a form to the API and goes to the page of what it made; what is refused stays on the form. */
export function useSend() {
  const router = useRouter();
  const [problem, setProblem] = useState<Problem | null>(null);
  async function send(
    method: 'POST' | 'PATCH',
    path: string,
    body: unknown,
    to: (id: string) => string,
  ): Promise<void> {
    setProblem(null);
    const answer = await callApi<{ id: string }>(method, path, body);
    if (!answer.ok) return setProblem(answer.problem);
    router.push(to(answer.value.id));
    router.refresh();
  }
  return { problem, send };
}
