// Runs in a page that plays the spreadsheet program on the web: it frames the add-in's page and speaks the message protocol of the
// program's own, unmodified client library. Self-contained, because it is sent into the page as text.

declare global {
  interface Window {
    /** Answers a batch of the client library; provided by the test. */
    answerBatch(body: string): Promise<string>;
    /** Sends the add-in events of the workbook, and calls of worksheet functions. */
    sendEvents(entries: unknown[]): void;
  }
}

interface Message {
  _messageType: number;
  _actionType: number;
  _actionName: string;
  _correlationId: number;
  _data?: { DdaMethod?: { DispatchId: number }; ArrayData?: unknown[] };
}

/**
 * @param addIn address of the add-in's page
 * @param usageReports whether the program asks the add-in's page for reports on its use
 */
export function playWebHost({ addIn, usageReports }: { addIn: string; usageReports: boolean }): void {
  const REQUEST = 0;
  const RESPONSE = 1;
  const LISTEN = 1;
  const BATCH = 93;
  const conversation = 'conversation';
  const instance = 'instance';
  const frame = document.createElement('iframe');
  let listening: Message | undefined;

  frame.title = 'The add-in';
  frame.style.cssText = 'width: 340px; height: 640px; border: 0';
  frame.name = JSON.stringify({
    baseFrameName: `_xdm_${instance}`,
    hostInfo: `Excel|Web|16.01|en-US|correlation||${usageReports ? '' : 'disableLogging'}|3`,
    xdmInfo: `${conversation}|${instance}|${encodeURIComponent(location.href)}`,
    serializerVersion: '1',
  });

  const post = (message: object) => frame.contentWindow!.postMessage(
    JSON.stringify({ _serializerVersion: 1, _messageType: RESPONSE, _conversationId: conversation, _origin: location.origin, _errorCode: 0, ...message }),
    new URL(addIn).origin,
  );
  const reply = (to: Message, data: unknown) => post({ _actionName: to._actionName, _correlationId: to._correlationId, _responseType: 0, _data: data });

  window.sendEvents = (entries) => {
    if (listening) post({ _actionName: listening._actionName, _correlationId: listening._correlationId, _responseType: 1, _data: { ArrayData: entries, Data: entries } });
  };

  const context = {
    _id: instance, _appName: 16, _appVersion: '16.0', _appUILocale: 'en-US', _dataLocale: 'en-US', _docUrl: 'Plan.xlsx', _clientMode: 1, _settings: [],
    _reason: 'documentOpened', _osfControlType: 1, _correlationId: 'correlation', _appInstanceId: instance,
    _requirementMatrix: JSON.stringify({ ExcelApi: 1.17, CustomFunctions: 1.12, CustomFunctionsRuntime: 1.5, SharedRuntime: 1.2, SharedRuntimeInternal: 1.2, RibbonApi: 1.2 }),
    _hostFullVersion: '16.0.18000.0', _addinName: 'Foldplan', _appDomains: [], _featureGates: {}, _initialDisplayMode: 2,
  };

  addEventListener('message', async ({ data }) => {
    const message = JSON.parse(data) as Message;
    if (message._messageType !== REQUEST) return;
    if (message._actionType === LISTEN) {
      if (message._actionName === 'richApiMessage') listening = message;
      reply(message, { Error: 0, Version: 1 });
    } else if (message._actionName === 'ContextActivationManager_getAppContextAsync') {
      reply(message, context);
    } else if (message._data?.DdaMethod?.DispatchId === BATCH) {
      const answer = await window.answerBatch(String(message._data.ArrayData![4]));
      reply(message, { Version: 1, Error: 0, Data: [200, [], answer] });
    } else {
      reply(message, { Version: 1, Error: 0 });
    }
  });

  frame.src = addIn;
  document.body.append(frame);
}
