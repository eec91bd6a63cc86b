/** The word mark: a beam on its fulcrum, off the middle, as real parts balance. */
export function WordMark({ size = 20 }: { size?: number }) {
  return (
    <span className="word-mark" style={{ fontSize: size }}>
      <svg viewBox="0 0 26 18" width={size * 1.3} height={size * 0.9} aria-hidden="true" focusable="false">
        <rect x="1" y="2" width="24" height="2.6" fill="currentColor" />
        <path d="M16 6.6 20.6 14.4H11.4Z" className="word-mark-fulcrum" />
      </svg>
      <span className="word-mark-name">Masswright</span>
    </span>
  );
}
