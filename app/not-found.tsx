import Link from 'next/link';

export default function NotFound() {
  return (
    <main className="mx-auto max-w-xl p-8">
      <h1 className="text-2xl">There is nothing here</h1>
      <p className="mt-2">
        What you look for does not exist, or is not yours to see.{' '}
        <Link className="link" href="/">
          To the board
        </Link>
      </p>
    </main>
  );
}
