export const usage = `Places kernels on fabrics, checks mappings and proves answers again.

npm run -s pinloom -- place --kernel K --fabric F [options]
  --kernel K          kernel, .json or .dot
  --fabric F          fabric, .json
  --pins P            pins, .json
  --objective O       wire (default): links of all nets; path: links of all paths
  --weights W         weights, .json: what nets (wire) or connections (path) count; 1 by default
  --engine E          auto (default), program, highs, simplex or search
  --time-limit-ms N   30000 by default
  --node-limit N      nodes after which the exact search ends; then the answer does not depend on the machine's
                      speed, as long as the time limit is not reached. Only for --engine auto
  --seed N            1 by default; with a node limit the same seed gives the same answer
  --another-than M    a mapping, .json, or what place has printed: looks for another one that costs no more
                      and is no mirror image of it. Given several times, for one that is none of them and
                      costs no more than the first

npm run -s pinloom -- pin-price --kernel K --fabric F --pins P --op OP [options]
  Solves with and without the pin of the op OP and tells what it costs: exact where both are proved, else
  from least to most. Options as for place; the limits are for each of the two.

npm run -s pinloom -- verify --kernel K --fabric F --mapping M [--weights W]
  Checks the mapping by rules R1 to R7 and names each one that it breaks. Weighted figures are by W,
  or by the weights that the mapping was made with.

npm run -s pinloom -- prove --kernel K --fabric F --certificate C [options]
  Solves the certificate's problem again, from its seed and start, and holds what comes out against it.
  --certificate C     certificate, .json, or what place has printed
  --pins P            pins, .json; the certificate's own where this is left out
  --weights W         weights, .json; the certificate's own where this is left out
  --mapping M         mapping, .json, to be checked as the answer that was proved
  --time-limit-ms N   3600000 by default

Each prints one JSON document on standard output and nothing else there.
Exit codes: 0 placed, legal or agreed, 1 the certificate does not agree,
2 bad input (file:line:column on standard error),
3 no legal mapping exists, or no other one, or rules are broken, 4 nothing found.
`;
