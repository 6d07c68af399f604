/** A task goes on whose end is not known; the words say which. */
export function Busy({ label }: { readonly label: string }) {
  return (
    <p role="status" className="px-4 py-6 text-ink-2 sm:px-6">
      <span className="busy-mark" aria-hidden="true" />
      {label}
    </p>
  )
}
