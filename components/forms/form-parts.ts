/** Every screen and dialog with a form of many fields, in one part with what holds their values. */
export { OpenBookDialog } from '@/components/books/open-book-dialog';
export { MarketEditor } from '@/components/market-data/market-editor';
export { RestateDialog } from '@/components/market-data/restate-dialog';
export { ReasonDialog, RoleDialog } from '@/components/people/act-dialogs';
export { PermissionDialog } from '@/components/people/permission-dialog';
export { PolicyFormScreen } from '@/components/policies/policy-form-screen';
export { AmendScreen } from '@/components/trades/amend-screen';
export { ProposeScreen } from '@/components/trades/propose-screen';
export { TradeActDialog } from '@/components/trades/trade-act-dialogs';
