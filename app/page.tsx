export const dynamic = 'force-dynamic'

export default function StartPage() {
  return <h1>Inverse Kelvin</h1>
}
