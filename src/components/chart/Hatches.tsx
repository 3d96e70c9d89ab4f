/**
 * The hatches, one meaning each. Ids carry a prefix, because a page may hold several charts and a pattern takes
 * its colours where it is defined.
 */
export function Hatches({ prefix }: { prefix: string }) {
  return (
    <defs>
      <pattern
        id={`${prefix}-hz`}
        width="5"
        height="5"
        patternUnits="userSpaceOnUse"
        patternTransform="rotate(45)"
      >
        <path className="hatch hatch--blocked" d="M0 0V5" />
      </pattern>
      <pattern
        id={`${prefix}-hz2`}
        width="4"
        height="4"
        patternUnits="userSpaceOnUse"
        patternTransform="rotate(-45)"
      >
        <path className="hatch hatch--hidden" d="M0 0V4" />
      </pattern>
    </defs>
  );
}
