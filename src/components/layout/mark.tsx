/** Two halves of one disc: the mark of the product. */
export function Mark({ size = 24 }: { readonly size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 32 32" aria-hidden>
      <path d="M15 3a13 13 0 0 0 0 26z" className="fill-[#5b93d6] dark:fill-[#8fb8ea]" />
      <path d="M17 3a13 13 0 0 1 0 26z" className="fill-[#1d4f8c] dark:fill-[#4f8fdb]" />
    </svg>
  );
}
