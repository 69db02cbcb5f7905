import type { Metadata } from 'next';
import { PageHead } from '@/components/ui/section';
import { OPERATIONS } from '@/lib/http/openapi';

export const metadata: Metadata = { title: 'API' };

export default function ApiPage() {
  return (
    <>
      <PageHead path="JSON over HTTP, under /api/v1" title="API" />
      <p className="pt-4">
        The whole description, with the shape of every request, is{' '}
        <a className="link" href="/api/v1/openapi.json">
          /api/v1/openapi.json
        </a>{' '}
        (OpenAPI 3.1). Sign in with the session cookie, or send a token from your account page as{' '}
        <code className="font-mono text-sm">Authorization: Bearer …</code>. Infinite values are written
        &quot;inf&quot;; errors are problem details with a sentence; a post may carry an Idempotency-Key.
      </p>
      <div className="mt-4 overflow-x-auto">
        <table className="ledger">
          <thead>
            <tr>
              <th scope="col">Method</th>
              <th scope="col">Path</th>
              <th scope="col">What it does</th>
            </tr>
          </thead>
          <tbody>
            {OPERATIONS.map(({ method, path, summary }) => (
              <tr key={method + path}>
                <td className="font-mono text-sm">{method.toUpperCase()}</td>
                <td className="font-mono text-sm">{path}</td>
                <td>{summary}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}
