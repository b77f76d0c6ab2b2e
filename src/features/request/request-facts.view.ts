import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { formatNumber, thinSpace } from '#src/lib/format-number.ts';
import { formatCurrentA, formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

const words = t.request;
const percent = 100;
const shownDecimals = 3;

/** As many decimals as were asked for, none that say nothing. */
function plain(value: number): string {
  const rounded = Number(value.toFixed(shownDecimals));
  const decimals = String(rounded).split('.')[1]?.length ?? 0;
  return formatNumber(rounded, { decimals });
}

/** What the result must reach: ± 10 % of the current, ± 2.4 µA, or how far bad cells lie from good. */
export function aimText(
  request: Pick<RequestDto, 'kind' | 'tolerance' | 'badToGoodRatio'>,
): string {
  if (request.kind === 'screening') {
    return words.ofGood(plain(request.badToGoodRatio));
  }
  return request.tolerance.kind === 'relative'
    ? words.ofCurrent(`±${thinSpace}${plain(request.tolerance.fraction * percent)}${thinSpace}%`)
    : `±${thinSpace}${formatCurrentA(request.tolerance.currentA)}`;
}

export function temperatureText(
  request: Pick<RequestDto, 'setTemperatureC' | 'setToleranceK'>,
): string {
  return request.setTemperatureC === null
    ? words.none
    : words.plusMinus(
        formatTemperature(request.setTemperatureC),
        `${plain(request.setToleranceK)}${thinSpace}K`,
      );
}
