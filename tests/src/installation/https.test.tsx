import { render, screen } from "@testing-library/react";
import { expect, test } from "vitest";
import { HttpsNotice } from "../../../src/features/installation/HttpsNotice.tsx";
import { needsHttps } from "../../../src/features/installation/needs-https.ts";

// "Potentially trustworthy" origins of the W3C's Secure Contexts: https, and http on localhost, 127.0.0.0/8 and ::1.
test("only plain HTTP from another computer needs HTTPS", () => {
  const of = (address: string) => needsHttps(new URL(address));
  expect(of("http://192.168.1.4:3000/x")).toBe(true);
  expect(of("http://surveys.example.org/")).toBe(true);
  expect(of("https://surveys.example.org/")).toBe(false);
  expect(of("http://localhost:3000/")).toBe(false);
  expect(of("http://survey.localhost/")).toBe(false);
  expect(of("http://127.0.0.9:3000/")).toBe(false);
  expect(of("http://[::1]:3000/")).toBe(false);
});

test("there the page names what stays shut: the offline field page and the phone's position", () => {
  const { rerender } = render(<HttpsNotice address={new URL("http://192.168.1.4:3000/")} />);
  screen.getByText("You are here over plain HTTP, at 192.168.1.4:3000.");
  screen.getByText(/field page that works without a network, and the position from the phone/);
  rerender(<HttpsNotice address={new URL("http://localhost:3000/")} />);
  expect(screen.queryByText(/plain HTTP/)).toBeNull();
});
