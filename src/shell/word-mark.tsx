/** A section through a stepped well: stairs from both sides, and the water they meet at. */
export function WordMark() {
  return (
    <span className="word-mark">
      <svg viewBox="0 0 32 28" width="32" height="28" aria-hidden="true" focusable="false">
        <path d="M0 2h6v7h4v7h4v7h4v-7h4V9h4V2h6v26H0z" fill="var(--brick)" />
        <path d="M10 16h12v7h-4v3h-4v-3h-4z" fill="var(--water)" />
        <path d="M11.5 19h9" stroke="var(--water-wash)" strokeWidth="1.5" />
      </svg>
      Stepwell
    </span>
  );
}
