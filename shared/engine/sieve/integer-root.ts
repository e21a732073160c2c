/** floor(sqrt(n)) for an integer 0 <= n < 2^53; the guess is mended by exact comparisons, squares staying below 2^53 + 2^28. */
export function floorSqrt(n: number): number {
  let root = Math.floor(Math.sqrt(n)) // heuristic: affects speed only
  while (root * root > n) root--
  while ((root + 1) * (root + 1) <= n) root++
  return root
}
