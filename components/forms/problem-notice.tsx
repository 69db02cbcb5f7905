import { Notice } from '../ui/notice';
import type { Problem } from './api-client';

/** What the server refused and why, with the fields it names. */
export function ProblemNotice({ problem }: { problem: Problem }) {
  return (
    <div role="alert">
      <Notice tone="bad" title={problem.title}>
        {problem.detail}
        {problem.errors.length > 0 ? (
          <ul className="mt-1 list-disc pl-5 text-sm">
            {problem.errors.map(({ path, message }) => (
              <li key={`${path}${message}`}>{path ? `${path}: ${message}` : message}</li>
            ))}
          </ul>
        ) : null}
      </Notice>
    </div>
  );
}
