/** The sign of the page: a lower triangle of stations, one of them open. */
export function Mark() {
  return (
    <svg className="mark" viewBox="0 0 20 20" width="20" height="20" aria-hidden="true" focusable="false">
      <path d="M2 2h4v4H2zM8 8h4v4H8zM14 14h4v4h-4zM2 14h4v4H2z" fill="currentColor" />
      <path d="M9 15h2v2H9z" fill="none" stroke="var(--fill)" strokeWidth="2" />
    </svg>
  );
}
