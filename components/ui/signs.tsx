import type { SVGProps } from 'react';

/** Our own signs. Each stands beside its word, so all are hidden from a reader unless given a `title`. */
export interface SignProps {
  /** Height in CSS pixels. */
  size?: number;
  /** Read aloud instead of being hidden; only where no word stands beside. */
  title?: string;
  className?: string;
}

interface FrameProps extends SignProps, Pick<SVGProps<SVGSVGElement>, 'children'> {
  box: readonly [number, number];
}

function Frame({ box: [width, height], size = height, title, className, children }: FrameProps) {
  const spoken = title ? { role: 'img', 'aria-label': title } : { 'aria-hidden': true as const };
  return (
    <svg
      {...spoken}
      className={`shrink-0 ${className ?? ''}`}
      width={(size * width) / height}
      height={size}
      viewBox={`0 0 ${width} ${height}`}
      fill="none"
    >
      {children}
    </svg>
  );
}

const wave = 'M0 15.2c2.2-2.3 4.3-2.3 6.5 0s4.3 2.3 6.5 0 4.3-2.3 6.5 0 4.3 2.3 6.5 0';

/** The mark: a staff crossed by a wave. */
export function Mark(props: SignProps) {
  return (
    <Frame box={[26, 28]} {...props}>
      <rect x="7" y="1" width="7" height="26" stroke="var(--ink)" strokeWidth="1.3" />
      <path d="M7 1h7v5.2H7zM7 11.4h7v5.2H7zM7 21.8h7V27H7z" fill="var(--ink)" />
      <path d={wave} stroke="var(--ground)" strokeWidth="6.5" />
      <path d={wave} stroke="var(--act)" strokeWidth="2.6" />
    </Frame>
  );
}

/** The only caution sign. */
export function Buoy(props: SignProps) {
  return (
    <Frame box={[22, 22]} size={24} {...props}>
      <g stroke="var(--needs)" strokeWidth="1.6">
        <path d="M11 1.2v4.3" />
        <path d="M11 1.2l4 1.7-4 1.7z" fill="var(--needs)" strokeWidth="1" />
        <path d="M8.2 5.6h5.6l2.3 10.4H5.9z" />
        <path d="M7.35 9.3h7.3l.85 3.6h-9z" fill="var(--needs)" stroke="none" />
        <path d="M1 17.6c1.7-1.6 3.3-1.6 5 0s3.3 1.6 5 0 3.3-1.6 5 0 3.3 1.6 5 0" />
      </g>
    </Frame>
  );
}

/** Seen at source, in the monitor's ink. */
export function Tick(props: SignProps) {
  return (
    <Frame box={[18, 16]} {...props}>
      <path d="M2 8.6c1.6 1.2 2.8 2.8 3.8 5C7.6 8.6 11 4.2 16 1.6" stroke="var(--note)" strokeWidth="1.9" strokeLinecap="round" />
    </Frame>
  );
}

/** Done, on a ledger. */
export function DoneTick(props: SignProps) {
  return (
    <Frame box={[18, 16]} {...props}>
      <path d="M2 8.6c1.6 1.2 2.8 2.8 3.8 5C7.6 8.6 11 4.2 16 1.6" stroke="var(--fine)" strokeWidth="1.9" strokeLinecap="round" />
    </Frame>
  );
}

/** Not yet. */
export function Dash(props: SignProps) {
  return (
    <Frame box={[18, 16]} {...props}>
      <path d="M4 9h9" stroke="var(--edge)" strokeWidth="1.25" />
    </Frame>
  );
}

/** An appointment or what truly happened; `now` turns it to the colour of the present. */
export function Notch({ now, ...props }: SignProps & { now?: boolean }) {
  return (
    <Frame box={[12, 12]} {...props}>
      <path d="M1 2h10l-5 9z" fill={now ? 'var(--needs)' : 'var(--ink)'} />
    </Frame>
  );
}

/** Needed by. */
export function Flag(props: SignProps) {
  return (
    <Frame box={[14, 18]} {...props}>
      <path d="M1 0V18" stroke="var(--ink)" strokeWidth="1.25" />
      <path d="M1 1h10l-2.5 3 2.5 3H1z" fill="var(--ink)" />
    </Frame>
  );
}

/** A window with its target; `gone` thickens the part already past, for a legend. */
export function Bracket({ gone, ...props }: SignProps & { gone?: boolean }) {
  if (!gone) {
    return (
      <Frame box={[36, 24]} {...props}>
        <path d="M2 8V16H34V8M18 16v5" stroke="var(--ink)" strokeWidth="1.5" />
      </Frame>
    );
  }
  return (
    <Frame box={[62, 20]} {...props}>
      <path d="M4 12H30" stroke="var(--act)" strokeWidth="4" />
      <path d="M30 12H58M4 6V18M58 6V18M31 12V19" stroke="var(--ink)" strokeWidth="1.25" />
    </Frame>
  );
}

/** Past the limit, for a legend. */
export function PastLimit(props: SignProps) {
  return (
    <Frame box={[34, 12]} {...props}>
      <path d="M0 6H34" stroke="var(--needs)" strokeWidth="1.75" strokeDasharray="2 3" />
    </Frame>
  );
}

/** Measured; hollow when provisional. */
export function Diamond({ provisional, ...props }: SignProps & { provisional?: boolean }) {
  return (
    <Frame box={[24, 24]} {...props}>
      <rect
        x="7"
        y="7"
        width="10"
        height="10"
        transform="rotate(45 12 12)"
        fill={provisional ? 'var(--ground)' : 'var(--act)'}
        stroke="var(--act)"
        strokeWidth={provisional ? 2 : 0}
      />
    </Frame>
  );
}

/** Days that are sealed. */
export function SealedLine(props: SignProps) {
  return (
    <Frame box={[40, 24]} {...props}>
      <path d="M0 12H40" stroke="var(--fine)" strokeWidth="4" />
      <path d="M13 6v12M27 6v12" stroke="var(--ground)" strokeWidth="4" />
      <path d="M13 6v12M27 6v12" stroke="var(--fine)" strokeWidth="1.75" />
    </Frame>
  );
}

/** A proof that broke. */
export function CutLine(props: SignProps) {
  return (
    <Frame box={[40, 24]} {...props}>
      <path d="M0 12H15" stroke="var(--fine)" strokeWidth="4" />
      <path d="M17 5l-4 14M24 5l-4 14" stroke="var(--needs)" strokeWidth="2" />
      <path d="M25 12H40" stroke="var(--edge)" strokeWidth="2" strokeDasharray="3 3" />
    </Frame>
  );
}
