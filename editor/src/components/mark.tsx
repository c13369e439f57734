/** The mark: a shade over the warm light it throws. Decorative beside the product's name. */
export function Mark({ size = 24 }: { size?: number }) {
  return (
    <svg viewBox="0 0 24 24" width={size} height={size} aria-hidden="true" focusable="false">
      <path d="M3.5 13a8.5 8.5 0 0 1 17 0z" fill="var(--text)" />
      <path d="M7.2 15.2h9.6L20.5 21h-17z" fill="var(--lamp)" />
    </svg>
  );
}
