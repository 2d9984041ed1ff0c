/** Every endpoint there is, by name: routes, OpenAPI and the role test are driven by this list. */
import * as books from './books';
import * as chain from './chain';
import * as historyExports from './exports';
import * as health from './health';
import * as history from './history';
import * as marketData from './market-data';
import * as people from './people';
import * as policies from './policies';
import * as quotes from './quotes';
import * as runs from './runs';
import * as sessions from './sessions';
import * as studies from './studies';
import * as tradeActs from './trade-acts';
import * as trades from './trades';
import * as underlyings from './underlyings';
import type { Endpoint } from '../endpoint';

export const endpoints = {
  getHealth: health.getHealth,
  signIn: sessions.signIn,
  refreshSession: sessions.refreshSession,
  signOut: sessions.signOut,
  stepUp: sessions.stepUp,
  getMe: sessions.getMe,
  listMembers: people.listMembers,
  setRole: people.setRole,
  changePermission: people.changePermission,
  endPermissionChange: people.endPermissionChange,
  suspendMember: people.suspendMember,
  reinstateMember: people.reinstateMember,
  listAccessEvents: people.listAccessEvents,
  listUnderlyings: underlyings.listUnderlyings,
  createQuote: quotes.createQuote,
  listQuotes: quotes.listQuotes,
  getQuote: quotes.getQuote,
  listSnapshots: marketData.listSnapshots,
  getSnapshot: marketData.getSnapshot,
  getPreviousClose: marketData.getPreviousClose,
  createSnapshot: marketData.createSnapshot,
  saveSnapshot: marketData.saveSnapshot,
  approveSnapshot: marketData.approveSnapshot,
  restateSnapshot: marketData.restateSnapshot,
  checkMarketFile: marketData.checkMarketFile,
  listPolicies: policies.listPolicies,
  createPolicy: policies.createPolicy,
  savePolicy: policies.savePolicy,
  approvePolicy: policies.approvePolicy,
  createBook: books.createBook,
  listBooks: books.listBooks,
  listTrades: trades.listTrades,
  getTrade: trades.getTrade,
  proposeTrade: tradeActs.proposeTrade,
  amendTrade: tradeActs.amendTrade,
  approveTrade: tradeActs.approveTrade,
  returnTrade: tradeActs.returnTrade,
  closeTrade: tradeActs.closeTrade,
  recordExpiry: tradeActs.recordExpiry,
  createRun: runs.createRun,
  listRuns: runs.listRuns,
  getRun: runs.getRun,
  cancelRun: runs.cancelRun,
  rerunRun: runs.rerunRun,
  listRunValuations: runs.listRunValuations,
  listRunExceptions: runs.listRunExceptions,
  getRunException: runs.getRunException,
  answerByOverride: runs.answerByOverride,
  answerByStudy: runs.answerByStudy,
  signOffRun: runs.signOffRun,
  createStudy: studies.createStudy,
  listStudies: studies.listStudies,
  getStudy: studies.getStudy,
  getStudyFile: studies.getStudyFile,
  cancelStudy: studies.cancelStudy,
  signOffStudy: studies.signOffStudy,
  sendBackStudy: studies.sendBackStudy,
  getChains: chain.getChains,
  startVerification: chain.startVerification,
  getVerification: chain.getVerification,
  listHistory: history.listHistory,
  getHistoryValue: history.getHistoryValue,
  createExport: historyExports.createExport,
  listExports: historyExports.listExports,
  getExport: historyExports.getExport,
  getExportFile: historyExports.getExportFile,
} satisfies Record<string, Endpoint>;

export type EndpointName = keyof typeof endpoints;
