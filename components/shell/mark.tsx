/** The name of the house and its sign: a loop that settles. */
export function Mark() {
  return (
    <span className="flex items-center gap-2 text-xl font-bold tracking-tight">
      <svg width="26" height="26" viewBox="0 0 26 26" aria-hidden="true">
        <path d="M2 21h22" stroke="var(--edge)" strokeWidth="2" />
        <path
          d="M2 21C6 21 7 5 11 5s4 8 7 8 3-2.500 6-2.500"
          fill="none"
          stroke="var(--petrol)"
          strokeWidth="3"
          strokeLinecap="round"
        />
      </svg>
      Fettle
    </span>
  );
}
