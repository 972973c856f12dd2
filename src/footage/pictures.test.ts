import { describe, expect, it } from "vitest";
import { type Pretence, pretendDecoder, pretendRecording } from "../../tests/helpers/pretend-decoder.ts";
import { DecoderChoice } from "./decoder-choice.ts";
import { picturesOf } from "./pictures.ts";

const recording = pretendRecording(200, { captureRateTag_hz: 40 });

async function open(...pretences: Pretence[]) {
  const began: number[] = [];
  const makers = pretences.map(
    (pretence, i) => async () =>
      pretendDecoder(`way ${i}`, recording, { ...pretence, began: (frame) => began.push(frame) }),
  );
  const choice = await DecoderChoice.among(recording, makers, undefined);
  began.length = 0;
  return { began, pictures: picturesOf({ recording, choice, settings: {}, close() {} }) };
}

describe("pictures in any order", () => {
  it("bear the number, the capture time and the content of the frame", async () => {
    const { pictures } = await open({});
    expect(pictures.facts.timeFactor).toBe(1 / 4);
    expect(pictures.times_s[199]).toBeCloseTo(199 / 40, 12);
    for (const index of [0, 1, 150, 149, 20, 199]) {
      const picture = await pictures.picture(index);
      expect(picture).toMatchObject({ index, t_s: pictures.times_s[index], width: 4, height: 2 });
      expect([...picture!.luma]).toEqual(Array(8).fill(index));
    }
    pictures.close();
  });

  it("keep their memory when others are asked for, also all at once", async () => {
    const { pictures } = await open({});
    const asked = [7, 3, 90, 8];
    const got = await Promise.all(asked.map((index) => pictures.picture(index)));
    expect(got.map((picture) => picture!.luma[0])).toEqual(asked);
  });

  it("go forward without beginning anew, and back in strides", async () => {
    const { pictures, began } = await open({});
    for (let i = 0; i < 60; i++) await pictures.picture(i);
    expect(began).toEqual([0]);
    await pictures.picture(150);
    expect(began).toEqual([0, 150]);
    for (let i = 149; i > 110; i--) await pictures.picture(i);
    expect(began).toEqual([0, 150, 129, 108]);
  });

  it("that can't be decoded are null, and those around them are right", async () => {
    const { pictures } = await open({ lacks: [5, 199] });
    expect(await pictures.picture(5)).toBeNull();
    expect((await pictures.picture(6))!.luma[0]).toBe(6);
    expect(await pictures.picture(199)).toBeNull();
    expect((await pictures.picture(4))!.luma[0]).toBe(4);
  });

  it("come from another decoder when one fails", async () => {
    const { pictures } = await open({ fails: { after: 50 } }, {});
    expect((await pictures.picture(49))!.luma[0]).toBe(49);
    expect((await pictures.picture(60))!.luma[0]).toBe(60);
    expect(pictures.facts.decoder).toBe("way 1");
  });

  it("are refused outside the recording", async () => {
    const { pictures } = await open({});
    for (const index of [-1, 200, 0.5, Number.NaN]) await expect(pictures.picture(index)).rejects.toThrow(RangeError);
  });
});
