import { useId } from 'react';

export interface PatternIds {
  water: string;
  hatch: string;
  outside: string;
}

/** Ids of the fills of one drawing; unique on the page, made on the server or in the browser alike. */
export function usePatterns(): PatternIds {
  const id = useId();
  return { water: `${id}-water`, hatch: `${id}-hatch`, outside: `${id}-outside` };
}

/** Water: an amount above zero. Hatch: a second series. Outside: beyond the rule. */
export function Patterns({ ids, water = 4.5 }: { ids: PatternIds; water?: number }) {
  return (
    <defs>
      <pattern id={ids.water} width="8" height={water} patternUnits="userSpaceOnUse">
        <path d={`M0 ${water / 2}H8`} stroke="var(--act)" strokeWidth="1.1" opacity="0.55" />
      </pattern>
      <pattern id={ids.hatch} width="4" height="4" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <path d="M0 0V4" stroke="var(--act)" />
      </pattern>
      <pattern id={ids.outside} width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <path d="M0 0V6" stroke="var(--needs)" strokeWidth="1.6" />
      </pattern>
    </defs>
  );
}

/** A fill by the id of its pattern. */
export function fillOf(id: string): string {
  return `url(#${id})`;
}
