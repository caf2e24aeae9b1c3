/** The part of the plotting library without maps: it adds no styles of its own that the page's policy refuses. */
declare module 'plotly.js-cartesian-dist-min' {
  export * from 'plotly.js-dist-min'
}
