/** A key of the keyboard beside the verb it does. */
export function KeyCap({ children }: { children: string }) {
  return <kbd className="key">{children}</kbd>
}
