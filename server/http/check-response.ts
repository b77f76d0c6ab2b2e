import type { Deps } from '#server/deps.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';

/**
 * Holds an answer against its contract and drops members the contract does not name. In development and
 * tests a mismatch fails the call; in production it is logged and the answer goes out as it is.
 */
export function checkResponse(
  deps: Pick<Deps, 'config' | 'log'>,
  contract: Contract,
  result: unknown,
  requestId: string,
): unknown {
  const parsed = contract.response.safeParse(result);
  if (parsed.success) {
    return parsed.data;
  }
  const faults = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
  if (deps.config.mode !== 'production') {
    throw new Error(`The answer of ${contract.name} breaks its contract: ${faults.join('; ')}`);
  }
  const paths = parsed.error.issues.map((issue) => issue.path.join('.'));
  deps.log.error({ requestId, contract: contract.name, paths }, 'answer breaks its contract');
  return result;
}
