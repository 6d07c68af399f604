/**
 * Stands in for @stdlib/assert-has-generator-support in the browser: the original asks by `eval`, which the content policy blocks and
 * reports. Every browser this product runs in has generators, so that sums take the same path there as on the server.
 */
module.exports = function hasGeneratorSupport() {
  return true
}
