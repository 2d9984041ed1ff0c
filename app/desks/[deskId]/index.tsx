import { Redirect } from 'expo-router';

export default function DeskRoute() {
  return <Redirect href="/" />;
}
