export function AccountsPage() {
  return null;
}
