import App from 'antd/es/app';
import ConfigProvider from 'antd/es/config-provider';
import { Outlet } from 'react-router-dom';
import { pageNonce } from '../lib/page-nonce';
import { antdTheme } from '../theme/antd-theme';
import { useColourMode, useIsPhone } from '../theme/colour-mode';

/**
 * Layout of the routes that use antd. It is loaded with the first of them, so that the shell, the sign-in page and the
 * owner's page stay light on a phone.
 */
export function AntdScope() {
  const { mode } = useColourMode();
  const phone = useIsPhone();
  return (
    <ConfigProvider theme={antdTheme(mode, phone)} csp={{ nonce: pageNonce() }}>
      <App component={false}>
        <Outlet />
      </App>
    </ConfigProvider>
  );
}
