/** A curve figure as the plotting library wants it, in the inks of the page. */
import type { CurveFigure, CurveSeries } from './curves'
import type { Inks } from './paint-map'

export interface PlotlyPicture {
  readonly traces: readonly object[]
  readonly layout: object
}

export function plotlyPicture(figure: CurveFigure, inks: Inks & { readonly accent: string; readonly text: string }, size_px: number): PlotlyPicture {
  const axis = ({ title, isLogarithmic }: CurveFigure['x']) => ({
    title: { text: title, standoff: 8 },
    type: isLogarithmic ? 'log' : 'linear',
    exponentformat: 'power',
    gridcolor: inks.blank,
    linecolor: inks.rule,
    zeroline: false,
    ticks: 'outside',
    tickcolor: inks.rule,
  })
  return {
    traces: figure.series.map((series) => trace(series, inks)),
    layout: {
      paper_bgcolor: inks.ground,
      plot_bgcolor: inks.ground,
      font: { family: inks.text, size: size_px, color: inks.ink },
      margin: { l: 6 * size_px, r: 1.5 * size_px, t: size_px, b: 4.8 * size_px },
      showlegend: false,
      hovermode: 'closest',
      xaxis: axis(figure.x),
      yaxis: axis(figure.y),
      shapes: figure.rules.map(({ axis: along, at }) => ruleShape(along, at, inks)),
      annotations: figure.rules.map(({ axis: along, at, name }) => ruleName(figure, along, at, name)),
    },
  }
} // prettier-ignore

function trace({ x, y, look, labels, name }: CurveSeries, inks: Inks & { readonly accent: string }): object {
  if (look === 'line') return { type: 'scatter', mode: 'lines', name, x, y, line: { color: inks.ink, width: 1.6 }, hoverinfo: 'x+y' }
  const marker =
    look === 'chosen'
      ? { size: 14, symbol: 'circle-open', color: inks.accent, line: { width: 2.5, color: inks.accent } }
      : { size: 7, color: inks.ground, line: { width: 1.4, color: inks.ink } }
  return { type: 'scatter', mode: 'markers', name, x, y, text: labels, hoverinfo: 'text', marker }
} // prettier-ignore

function ruleShape(along: 'x' | 'y', at: number, inks: Inks): object {
  const across = along === 'x' ? { x0: at, x1: at, yref: 'paper', y0: 0, y1: 1 } : { y0: at, y1: at, xref: 'paper', x0: 0, x1: 1 }
  return { type: 'line', ...across, line: { color: inks.quiet, width: 1, dash: 'dot' } }
} // prettier-ignore

function ruleName(figure: CurveFigure, along: 'x' | 'y', at: number, name: string): object {
  const place = figure[along].isLogarithmic ? Math.log10(at) : at
  return along === 'x'
    ? { x: place, yref: 'paper', y: 1, text: name, showarrow: false, xanchor: 'right', xshift: -4, yanchor: 'top' }
    : { y: place, xref: 'paper', x: 0, text: name, showarrow: false, xanchor: 'left', xshift: 4, yanchor: 'bottom' }
}
