import { StaffShellExample } from '@/components/shell/shell.examples';

/** The staff frame by itself: it holds the page's one main part. */
export default function StaffShellPage() {
  return <StaffShellExample />;
}
