import {
  ArrowDown,
  ArrowLeft,
  ArrowUp,
  Check,
  ChevronDown,
  CircleAlert,
  Download,
  ExternalLink,
  KeyRound,
  ListFilter,
  Lock,
  Mail,
  Menu,
  Minus,
  Phone,
  Plus,
  Printer,
  Search,
  Upload,
  X,
  type LucideIcon,
} from 'lucide-react';

const verbs = {
  add: Plus,
  back: ArrowLeft,
  call: Phone,
  choose: ChevronDown,
  chosen: Check,
  closed: Lock,
  dismiss: X,
  down: ArrowDown,
  find: Search,
  leave: ExternalLink,
  less: Minus,
  menu: Menu,
  narrow: ListFilter,
  passkey: KeyRound,
  print: Printer,
  save: Download,
  send: Upload,
  up: ArrowUp,
  warn: CircleAlert,
  write: Mail,
} satisfies Record<string, LucideIcon>;

export type VerbName = keyof typeof verbs;

/** A verb of the interface (Lucide, ISC): 1.6 px, square caps, mitred joins. Always beside its word. */
export function Verb({ name, size = 17, className }: { name: VerbName; size?: number; className?: string }) {
  const Icon = verbs[name];
  return (
    <Icon
      size={size}
      strokeWidth={(1.6 * 24) / Math.max(size, 17)}
      absoluteStrokeWidth={false}
      strokeLinecap="square"
      strokeLinejoin="miter"
      aria-hidden="true"
      className={`shrink-0 ${className ?? ''}`}
    />
  );
}
