import { Money } from '../../components/money.tsx'

type StatementMoneyProps = { amountMinor: string | bigint; currency: string; currencyDigits: number }

/** An amount in the statement's own currency, which is fixed when it is made. */
export function StatementMoney(props: StatementMoneyProps) {
  return <Money {...props} signed />
}
