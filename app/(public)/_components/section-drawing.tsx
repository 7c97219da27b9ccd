/** A section through an invented template with the formed sheet over it. On a small screen its left part is shown. */
export function SectionDrawing() {
  return (
    <figure className="border border-rule bg-sheet">
      <svg
        role="img"
        aria-label="Section through a template: hatched body, the sheet over it, a wall with 10.4 degrees of draft, an inside corner with a radius of 0.2 mm where 0.8 mm is wanted, a top 60 mm wide, and a vent of 0.6 mm."
        viewBox="0 0 900 290"
        preserveAspectRatio="xMinYMid slice"
        className="h-72 w-full fill-none"
      >
        <defs>
          <pattern
            id="section-hatch"
            width="9"
            height="9"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <path d="M0 0v9" className="stroke-slate" strokeWidth="0.7" />
          </pattern>
        </defs>
        <path
          d="M52 236 74 202h34l21-114q2-8 10-8h128q8 0 10 8l18 98h42l14-50q2-7 9-7h168q7 0 9 7l14 50h48l16-70q2-7 9-7h92q7 0 9 7l20 86h34l22 34Z"
          fill="url(#section-hatch)"
          className="stroke-ink"
          strokeWidth="1.3"
        />
        <path
          d="M0 233h49l23-34.5h32.5l21-112q2.5-10 13.5-10h128q11 0 13.5 10l17.5 96h36l13.5-48.5q3-8.5 12.5-8.5h168q9.5 0 12.5 8.5l13.5 48.5h42l15.5-68.5q3-8.5 12.5-8.5h92q9.5 0 12.5 8.5l19.5 84.5h33l22.5 34.5H900"
          className="stroke-verdigris"
          strokeWidth="4.5"
          strokeLinejoin="round"
        />
        <path d="M0 236.500h900" className="stroke-ink" strokeWidth="1" />
        <path d="M314 186v50M318 186v50" className="stroke-ink" strokeWidth="0.8" />
        <g className="stroke-ink" strokeWidth="0.9">
          <path d="M121 116 150 40h74" />
          <path d="M316 237v13h20" />
          <path d="M129 248v24M277 248v24M129 262h148" />
        </g>
        <g className="stroke-madder" strokeWidth="0.9">
          <path d="M106 199 62 120H20" />
        </g>
        <g className="fill-ink font-mono" fontSize="12">
          <text x="154" y="34">
            draft 10.4°
          </text>
          <text x="342" y="254">
            vent 0.6
          </text>
          <text x="186" y="257" className="fill-ink">
            60.0
          </text>
          <text x="20" y="113" className="fill-madder">
            radius 0.2
          </text>
        </g>
      </svg>
      <figcaption className="border-t border-rule px-4 py-2 text-sm text-slate">
        A section through a template, with the sheet drawn thicker than it is. The figures are an example of
        what a check measures.
      </figcaption>
    </figure>
  );
}
