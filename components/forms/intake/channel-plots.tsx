import { type PreviewChannel } from '@/lib/domain/upload-preview'
import { channelPath } from './channel-path'
import { channelWords } from './channel-words'

const WIDTH = 240
const HEIGHT = 40
const MARGIN = 3

function rangeText(channel: PreviewChannel): string {
  const { format } = channelWords(channel.name)
  if (channel.minimum === null || channel.maximum === null) return 'no value'
  if (channel.name.startsWith('isBypass') && channel.minimum !== channel.maximum) return 'reactor and bypass'
  const low = format(channel.minimum)
  const high = format(channel.maximum)
  return low === high ? low : `${low} to ${high}`
}

/** Each channel small: enough to see a wrong unit, a dead sensor or a clock that jumped before it is taken in. */
export function ChannelPlots({ channels }: { readonly channels: readonly PreviewChannel[] }) {
  if (channels.length === 0) return null
  return (
    <ul className="m-0 grid list-none grid-cols-1 gap-x-8 gap-y-4 p-0 sm:grid-cols-2 lg:grid-cols-3 xl:grid-cols-4">
      {channels.map((channel) => {
        const { label } = channelWords(channel.name)
        const range = rangeText(channel)
        const missing =
          channel.missingCount === 0
            ? ''
            : `${channel.missingCount.toLocaleString('en')} ${channel.missingCount === 1 ? 'value' : 'values'} missing`
        return (
          <li key={channel.name} className="min-w-0">
            <div className="flex flex-wrap justify-between gap-x-3 text-[13px]">
              <span>{label}</span>
              <span className="text-ink-2">{range}</span>
            </div>
            <svg
              role="img"
              aria-label={`${label} over time: ${range}${missing === '' ? '' : `, ${missing}`}`}
              viewBox={`0 0 ${String(WIDTH)} ${String(HEIGHT + 2 * MARGIN)}`}
              preserveAspectRatio="none"
              className="mt-0.5 block h-12 w-full border-b border-line"
            >
              <path
                d={channelPath(channel, WIDTH, HEIGHT)}
                transform={`translate(0 ${String(MARGIN)})`}
                className="fill-none stroke-accent"
                strokeWidth={1.5}
                strokeLinejoin="round"
                strokeLinecap="round"
                vectorEffect="non-scaling-stroke"
              />
            </svg>
            {missing === '' ? null : <div className="text-[12.5px] text-doubt">{missing}</div>}
          </li>
        )
      })}
    </ul>
  )
}
