/**
 * The side of Excel on the web in the page that holds the pane's frame: messages as JSON between two windows, as the
 * library's build for the web speaks them with the product. Runs in the browser, so it stands alone.
 */

/** What the frame is told about its host. */
export interface FrameSettings {
  readonly paneUrl: string;
  /** The ExcelApi requirement set. */
  readonly requirementSet: string;
  readonly displayLanguage: string;
  readonly contentLanguage: string;
  /** Of the frame, in pixels. */
  readonly width: number;
  readonly height: number;
}

export interface FrameEvent {
  readonly messageType: number;
  readonly targetId: string;
  readonly content: Readonly<Record<string, unknown>>;
}

/** What the page offers to the test once the frame is there. */
export interface FrameWindow {
  /** Set by the test: carries out a batch. Without an answer, the pane never gets one. */
  readonly planrowExchange: (text: string, flags: number) => Promise<string | null>;
  readonly planrowEvent: (event: FrameEvent) => void;
  readonly planrowCommand: (id: string, functionName: string) => void;
}

/** Puts the pane's frame into the page and answers it. */
export function holdPaneFrame(settings: FrameSettings): void {
  /** What the library calls the batch of its object model among all that it can ask. */
  const executeBatchId = 93;
  const eventDispatchIds = { richApi: 33, command: 39 };
  const messageKinds = { request: 0, response: 1 };
  const actionKinds = { register: 1, unregister: 2 };
  const eventCategory = 65_536;
  /** Errors that Excel on the web gives for the whole request, by the code that the library makes of them. */
  const requestErrors: Readonly<Record<string, number>> = {
    InvalidOperationInCellEditMode: 5004,
    WriteNotSupportedWhenModalDialogOpen: 5016,
    ActivityLimitReached: 5102,
    RequestPayloadSizeLimitExceeded: 5103,
    ResponsePayloadSizeLimitExceeded: 5104,
    AccessDenied: 7000,
  };

  interface FrameMessage {
    readonly _messageType: number;
    readonly _actionType?: number;
    readonly _actionName: string;
    readonly _correlationId: number;
    readonly _data: {
      readonly eventDispId?: number;
      readonly DdaMethod?: { readonly DispatchId: number };
      readonly ArrayData?: readonly unknown[];
    };
  }

  const conversation = 'conversation-1';
  const application = 'application-1';
  const { origin } = location;
  const registered = new Map<string, FrameMessage>();
  const frame = document.createElement('iframe');
  frame.id = 'pane';
  frame.title = 'Planrow';
  frame.style.cssText = `width:${settings.width}px;height:${settings.height}px;border:0`;
  frame.name = JSON.stringify({
    baseFrameName: 'frame-1',
    hostInfo: `Excel|Web|16.01|${settings.displayLanguage}|correlation-1|||0`,
    xdmInfo: `${conversation}|${application}|${origin}`,
    serializerVersion: '1',
    flights: '[]',
  });

  const post = (message: object): void =>
    frame.contentWindow!.postMessage(
      JSON.stringify({
        _messageType: messageKinds.response,
        _conversationId: conversation,
        _origin: origin,
        _serializerVersion: 1,
        ...message,
      }),
      '*',
    );
  const reply = (to: FrameMessage, data: unknown): void =>
    post({
      _actionName: to._actionName,
      _correlationId: to._correlationId,
      _errorCode: 0,
      _responseType: 0,
      _data: data,
    });
  const raise = (dispatchId: number, data: unknown): void => {
    for (const [name, message] of registered) {
      if (message._data.eventDispId === dispatchId) {
        post({
          _actionName: name,
          _correlationId: message._correlationId,
          _errorCode: 0,
          _responseType: 1,
          _data: data,
        });
      }
    }
  };

  const applicationContext = (): object => ({
    _id: application,
    _appName: 16,
    _appVersion: '16.0',
    _appUILocale: settings.displayLanguage,
    _dataLocale: settings.contentLanguage,
    _docUrl: 'https://host.test/Week.xlsx',
    _clientMode: 1,
    _settings: [],
    _reason: 'documentOpened',
    _osfControlType: 1,
    _eToken: '',
    _correlationId: 'correlation-1',
    _appInstanceId: 'instance-1',
    _appMinorVersion: 0,
    _requirementMatrix: JSON.stringify({
      ExcelApi: settings.requirementSet,
      RichApiRuntimeFlag: '1.2',
      DelayForCellEdit: '1.1',
      DialogApi: '1.2',
      RibbonApi: '1.2',
      SharedRuntime: '1.1',
      Settings: '1.1',
      ExcelApiUndo: '1.20',
    }),
    _hostFullVersion: '16.0.18000.40000',
    _addinName: 'Planrow',
    _appDomains: [],
    _featureGates: {},
    _initialDisplayMode: 0,
  });

  const execute = async (message: FrameMessage): Promise<void> => {
    const { DdaMethod: method, ArrayData: data = [] } = message._data;
    if (method?.DispatchId !== executeBatchId) {
      reply(message, { Version: 1, Error: 5001 });
      return;
    }
    const { planrowExchange } = window as unknown as FrameWindow;
    const answer = await planrowExchange(String(data[4]), Number(data[6]));
    if (answer === null) return;
    const response = JSON.parse(answer) as { Error?: { Code: string }; Results: unknown[] };
    const requestError =
      response.Results.length === 0 ? requestErrors[response.Error?.Code ?? ''] : undefined;
    if (requestError === undefined) {
      reply(message, {
        Version: 1,
        Error: 0,
        Data: [200, ['CONTENT-TYPE', 'application/json'], answer],
      });
    } else {
      reply(message, { Version: 1, Error: requestError });
    }
  };

  addEventListener('message', (event) => {
    if (event.source !== frame.contentWindow || typeof event.data !== 'string') return;
    let message: FrameMessage;
    try {
      message = JSON.parse(event.data) as FrameMessage;
    } catch {
      return;
    }
    if (message._messageType !== messageKinds.request) return;
    if (message._actionType === actionKinds.register) {
      registered.set(message._actionName, message);
      reply(message, { Error: 0 });
    } else if (message._actionType === actionKinds.unregister) {
      registered.delete(message._actionName);
      reply(message, { Error: 0 });
    } else if (message._actionName === 'ContextActivationManager_getAppContextAsync') {
      reply(message, applicationContext());
    } else if (message._actionName === 'executeMethod') {
      void execute(message);
    }
  });

  const offered: Omit<FrameWindow, 'planrowExchange'> = {
    planrowEvent: ({ messageType, targetId, content }) =>
      raise(eventDispatchIds.richApi, {
        ArrayData: [[eventCategory, messageType, targetId, JSON.stringify(content), 1, false]],
      }),
    planrowCommand: (id, functionName) =>
      raise(eventDispatchIds.command, [id, functionName, JSON.stringify({ source: { id } })]),
  };
  Object.assign(window, offered);
  frame.src = settings.paneUrl;
  document.body.append(frame);
}
