import { practicalChannel } from './practical-channel'
import { type PreviewChannel } from '@/lib/domain/upload-preview'

const WIDTH = 220
const HEIGHT = 44

function pathOf(channel: PreviewChannel): string {
  const { timeS, values } = channel
  const first = timeS[0] ?? 0
  const span = (timeS.at(-1) ?? first) - first || 1
  const low = channel.minimum ?? 0
  const range = (channel.maximum ?? low) - low || 1
  let path = ''
  let isDown = false
  values.forEach((value, i) => {
    if (value === null) {
      isDown = false
      return
    }
    const x = (((timeS[i] ?? first) - first) / span) * WIDTH
    const y = HEIGHT - 2 - ((value - low) / range) * (HEIGHT - 4)
    path += `${isDown ? 'L' : 'M'}${x.toFixed(1)} ${y.toFixed(1)}`
    isDown = true
  })
  return path
}

/** One channel as it would be taken in, small: its course, its least and greatest value, what is missing. */
export function ChannelPlot({ channel }: { readonly channel: PreviewChannel }) {
  const { name, low, high } = practicalChannel(channel)
  const missing = channel.missingCount > 0 ? `, ${channel.missingCount} missing` : ''
  const said = low === null ? `${name}: no value` : `${name}: ${low} to ${high}${missing}`
  return (
    <figure className="m-0">
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        width="100%"
        height={HEIGHT}
        preserveAspectRatio="none"
        role="img"
        aria-label={said}
      >
        <path
          d={pathOf(channel)}
          fill="none"
          stroke="var(--accent)"
          strokeWidth="1.2"
          vectorEffect="non-scaling-stroke"
        />
      </svg>
      <figcaption className="text-[12.5px] text-ink-2">{said}</figcaption>
    </figure>
  )
}
