/** The right half of the sheet: one panel at a time, beside the stage that all of them speak to. */
import { Tab, TabList, TabPanel, Tabs } from 'react-aria-components';
import { type PanelName, showPanel, useView } from '../store/viewStore.ts';
import { CasesPanel } from './CasesPanel.tsx';
import { ChecksPanel } from './ChecksPanel.tsx';
import { JointPanel } from './JointPanel.tsx';
import { MapPanel } from './MapPanel.tsx';
import { SharesPanel } from './SharesPanel.tsx';
import { WaysPanel } from './WaysPanel.tsx';
import { WorstPanel } from './WorstPanel.tsx';

export function Panels() {
  const panel = useView((state) => state.panel);
  return (
    <Tabs className="panels" selectedKey={panel} onSelectionChange={(key) => showPanel(key as PanelName)}>
      <TabList aria-label="Panels of the sheet" className="panel-names">
        <Tab id="joint">Joint</Tab>
        <Tab id="checks">Checks</Tab>
        <Tab id="shares">Shares</Tab>
        <Tab id="map">Pose map</Tab>
        <Tab id="worst">Worst loads</Tab>
        <Tab id="ways">Two ways</Tab>
        <Tab id="cases">Cases</Tab>
      </TabList>
      <TabPanel id="joint" className="panel">
        <JointPanel />
      </TabPanel>
      <TabPanel id="checks" className="panel">
        <ChecksPanel />
      </TabPanel>
      <TabPanel id="shares" className="panel">
        <SharesPanel />
      </TabPanel>
      <TabPanel id="map" className="panel">
        <MapPanel />
      </TabPanel>
      <TabPanel id="worst" className="panel">
        <WorstPanel />
      </TabPanel>
      <TabPanel id="ways" className="panel">
        <WaysPanel />
      </TabPanel>
      <TabPanel id="cases" className="panel">
        <CasesPanel />
      </TabPanel>
    </Tabs>
  );
}
