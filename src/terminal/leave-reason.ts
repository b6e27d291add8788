/** Why the terminal was left for good. */
export type LeaveReason =
  /** The program closed it, or ended of its own accord. */
  | { readonly kind: 'closed' }
  /** A signal, or the key that stands for it: Ctrl-C (SIGINT), Ctrl-\ (SIGQUIT). The process ends by that signal. */
  | { readonly kind: 'signal'; readonly signal: NodeJS.Signals }
  /** An error that nobody caught. The process ends with exit code 70. */
  | { readonly kind: 'error'; readonly error: unknown };
