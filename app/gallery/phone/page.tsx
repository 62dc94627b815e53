import { PhoneShellExample } from '@/components/shell/shell.examples';

/** The participant's frame by itself. */
export default function PhoneShellPage() {
  return <PhoneShellExample />;
}
