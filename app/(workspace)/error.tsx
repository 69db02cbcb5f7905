'use client';

import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';

export default function PageError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return (
    <div className="grid max-w-xl gap-4 pt-8">
      <Notice tone="bad" title="This page could not be made">
        It is not your doing. {error.digest ? `Its number in the log is ${error.digest}.` : ''}
      </Notice>
      <div>
        <Button onClick={reset}>Try again</Button>
      </div>
    </div>
  );
}
