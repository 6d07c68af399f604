/** Measured values of the reference cases that are too long to stand beside their check. Sources stand with the checks. */

const column = (text: string): number[] => text.trim().split(/\s+/).map(Number)

const norrisPairs = column(`
.1 .2 338.8 337.4 118.1 118.2 888.0 884.6 9.2 10.1 228.1 226.5 668.5 666.3 998.5 996.3 449.1 448.6 778.9 777.0 559.2 558.2 .3 .4 .1 .6
778.1 775.5 668.8 666.9 339.3 338.0 448.9 447.5 10.8 11.6 557.7 556.0 228.3 228.1 998.0 995.8 888.8 887.6 119.6 120.2 .3 .3 .6 .3
557.6 556.8 339.3 339.1 888.0 887.2 998.5 999.0 778.9 779.0 10.2 11.1 117.6 118.3 228.9 229.2 668.4 669.1 449.2 448.9 .2 .5`)
export const NORRIS = {
  y: norrisPairs.filter((_unused, i) => i % 2 === 0),
  x: norrisPairs.filter((_unused, i) => i % 2 === 1),
}

const loads = Array.from({ length: 20 }, (_unused, i) => 150_000 * (i + 1))
export const PONTIUS = {
  x: [...loads, ...loads],
  y: column(`
.11019 .21956 .32949 .43899 .54803 .65694 .76562 .87487 .98292 1.09146 1.20001 1.30822 1.41599 1.52399 1.63194 1.73947 1.84646 1.95392
2.06128 2.16844 .11052 .22018 .32939 .43886 .54798 .65739 .76596 .87474 .98300 1.09150 1.20004 1.30818 1.41613 1.52408 1.63159 1.73965
1.84696 1.95445 2.06177 2.16829`),
}

const deflator = column('83 88.5 88.2 89.5 96.2 98.1 99 100 101.2 104.6 108.4 110.8 112.6 114.2 115.7 116.9')
const product = column(
  '234289 259426 258054 284599 328975 346999 365385 363112 397469 419180 442769 444546 482704 502601 518173 554894',
)
const unemployed = column('2356 2325 3682 3351 2099 1932 1870 3578 2904 2822 2936 4681 3813 3931 4806 4007')
const armed = column('1590 1456 1616 1650 3099 3594 3547 3350 3048 2857 2798 2637 2552 2514 2572 2827')
const population = column(
  '107608 108632 109773 110929 112075 113270 115094 116219 117388 118734 120445 121950 123366 125368 127852 130081',
)
export const LONGLEY = {
  rows: deflator.map((value, i) => [
    1,
    value,
    product[i] ?? NaN,
    unemployed[i] ?? NaN,
    armed[i] ?? NaN,
    population[i] ?? NaN,
    1947 + i,
  ]),
  y: column('60323 61122 60171 61187 63221 63639 64989 63761 66019 67857 68169 66513 68655 69564 69331 70551'),
}

export const TOLUCA = {
  x: column('80 30 50 90 70 60 120 80 100 50 40 70 90 20 110 100 30 50 90 110 30 90 40 80 70'),
  y: column('399 121 221 376 361 224 546 352 353 157 160 252 389 113 435 420 212 268 377 421 273 468 244 342 323'),
}

export const PLANT_GROWTH = [
  column('4.17 5.58 5.18 6.11 4.50 4.61 5.17 4.53 5.33 5.14'),
  column('4.81 4.17 4.41 3.59 5.87 3.83 6.03 4.89 4.32 4.69'),
  column('6.31 5.12 5.54 5.50 5.37 5.29 4.92 6.15 5.80 5.26'),
] as const

const anscombeX = column('10 8 13 9 11 14 6 4 12 7 5')
export const ANSCOMBE = [
  { x: anscombeX, y: column('8.04 6.95 7.58 8.81 8.33 9.96 7.24 4.26 10.84 4.82 5.68') },
  { x: anscombeX, y: column('9.14 8.14 8.74 8.77 9.26 8.10 6.13 3.10 9.13 7.26 4.74') },
  { x: anscombeX, y: column('7.46 6.77 12.74 7.11 7.81 8.84 6.08 5.39 8.15 6.42 5.73') },
  { x: column('8 8 8 8 8 8 8 19 8 8 8'), y: column('6.58 5.76 7.71 8.84 8.47 7.04 5.25 12.50 5.56 7.91 6.89') },
] as const

const pentaneH = column(
  '205.8 404.8 209.7 401.6 224.9 402.6 212.7 406.2 133.3 470.9 300.0 301.6 297.3 314.0 305.7 300.1 305.4 305.2 300.1 106.6 417.2 251.0 250.3 145.1',
)
const pentaneP = column(
  '90.9 92.9 174.9 187.2 92.7 102.2 186.9 192.6 140.8 144.2 68.3 214.6 142.2 146.7 142.0 143.7 141.1 141.5 83.0 209.6 83.9 294.4 148.0 291.0',
)
const pentaneI = column(
  '37.1 36.3 49.4 44.9 116.3 128.9 134.4 134.9 87.6 86.9 81.7 101.7 10.5 157.1 86.0 90.2 87.4 87.0 66.4 33.0 32.9 41.5 14.7 50.2',
)
const pentaneR = column(
  '3.541 2.397 6.694 4.722 .593 .268 2.797 2.451 3.196 2.021 .896 5.084 5.686 1.193 2.648 3.303 3.054 3.302 1.271 11.648 2.002 9.604 7.754 11.590',
)
export const PENTANE = pentaneR.map((r, i) => ({
  r,
  h: pentaneH[i] ?? NaN,
  p: pentaneP[i] ?? NaN,
  i: pentaneI[i] ?? NaN,
}))

const tolueneRate = column('71 71.3 41.6 19.7 42 17.1 71.8 142 284 47 71.3 117 127 131 133 41.8')
const tolueneT = column('1 1 1 1 1 1 1 1 1 .5 1 5 10 15 20 1')
const tolueneH = column('1 1 1 1 1 1 1 2 4 1 1 1 1 1 1 1')
const tolueneB = column('0 0 1 4 1 5 0 0 0 0 0 0 0 0 0 1')
export const TOLUENE = tolueneRate.map((rate, i) => ({
  rate,
  pressures: { T: tolueneT[i] ?? NaN, H2: tolueneH[i] ?? NaN, B: tolueneB[i] ?? NaN },
}))

const concentrations = column('.02 .02 .06 .06 .11 .11 .22 .22 .56 .56 1.10 1.10')
export const PUROMYCIN = {
  treated: { c: concentrations, r: column('76 47 97 107 123 139 159 152 191 201 207 200') },
  untreated: { c: concentrations.slice(0, 11), r: column('67 51 84 86 98 115 131 124 144 158 160') },
}
