/** Says what went wrong in a passing notice. What draws notices is fetched apart from the first page. */
export function sayFault(text: string): void {
  void import('sonner').then(({ toast }) => toast.error(text))
}
