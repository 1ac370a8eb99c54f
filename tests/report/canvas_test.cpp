// The canvas draws where it is told, measures what it writes, and saves whole or not at all.

#include "report/canvas.h"

#include "report_support.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

using CanvasTest = FolderTest;

TEST_F(CanvasTest, RefusesOtherKindsOfPicture) {
  try {
    const Canvas canvas(folder_ / "map.jpg", 10, 10);
    FAIL() << "no error";
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::plan);
    EXPECT_EQ(error.parts().found, ".jpg");
  }
}

TEST_F(CanvasTest, SavesNothingBeforeItIsAsked) {
  { const Canvas canvas(folder_ / "a.png", 10, 10); }
  EXPECT_EQ(entries(), 0);
  Canvas canvas(folder_ / "none" / "a.png", 10, 10);
  EXPECT_THROW(canvas.save(), Error);
  EXPECT_EQ(entries(), 0);
}

TEST_F(CanvasTest, APictureTooLargeForCairoIsAnError) {
  EXPECT_THROW(Canvas(folder_ / "a.png", 40000.0, 10.0), Error);
}

TEST_F(CanvasTest, FillsPixelsAtItsScale) {
  Canvas canvas(folder_ / "a.png", 20, 10, 2.0);
  canvas.fill({5, 2, 10, 6}, ink::kAccent);
  canvas.save();
  const Pixels pixels(folder_ / "a.png");
  EXPECT_EQ(pixels.width(), 40);
  EXPECT_EQ(pixels.height(), 20);
  EXPECT_EQ(pixels.count({0, 0, 40, 20}, ink::kAccent), 20 * 12);
  EXPECT_EQ(pixels.count({10, 4, 20, 12}, ink::kAccent), 20 * 12);
  EXPECT_EQ(pixels.at(0, 0), rgb_of(ink::kPaper));
  EXPECT_EQ(pixels.at(39, 19), rgb_of(ink::kPaper));
}

TEST_F(CanvasTest, DrawsImagesPixelByPixelAndSeesThroughTheMissing) {
  const Colour one = light_colour(0.1);
  const Colour two = light_colour(0.9);
  Canvas canvas(folder_ / "a.png", 100, 100);
  canvas.fill({0, 0, 100, 100}, ink::kAccent);
  canvas.image({10, 10, 80, 80}, {2, 2, {opaque_pixel(one), opaque_pixel(two), 0U, opaque_pixel(one)}});
  canvas.save();
  const Pixels pixels(folder_ / "a.png");
  EXPECT_EQ(pixels.count({10, 10, 40, 40}, one), 1600);
  EXPECT_EQ(pixels.count({50, 10, 40, 40}, two), 1600);
  EXPECT_EQ(pixels.count({10, 50, 40, 40}, ink::kAccent), 1600);
  EXPECT_EQ(pixels.count({50, 50, 40, 40}, one), 1600);
  EXPECT_EQ(pixels.at(9, 50), rgb_of(ink::kAccent));
}

TEST_F(CanvasTest, AnSvgIsWellFormedAndHoldsItsImage) {
  Canvas canvas(folder_ / "a.svg", 300, 200);
  {
    const PixelImage gone_before_saving{1, 1, {opaque_pixel(light_colour(0.5))}};
    canvas.image({10, 10, 80, 80}, gone_before_saving);
  }
  canvas.text({20, 150}, "a < b & c", {20.0});
  canvas.save();
  const auto elements = elements_of(content(folder_ / "a.svg"));
  ASSERT_FALSE(elements.empty());
  EXPECT_EQ(elements.front().path, "/svg");
  EXPECT_EQ(elements.front().attributes.at("viewBox"), "0 0 300 200");
  EXPECT_TRUE(std::any_of(elements.begin(), elements.end(),
                          [](const XmlElement& element) { return element.path.ends_with("/image"); }));
}

// What is measured is what is inked: no pixel of a text lies outside its box.
TEST_F(CanvasTest, TextBoxesHoldTheirInk) {
  const std::vector<TextStyle> styles{{24.0},
                                      {17.0, true},
                                      {44.0, true},
                                      {24.0, false, ink::kText, Align::right},
                                      {24.0, false, ink::kText, Align::centre}};
  int number = 0;
  for (const TextStyle& style : styles) {
    const auto file = folder_ / ("text" + std::to_string(number++) + ".png");
    Canvas canvas(file, 900, 100);
    const Box box = canvas.text({450, 50}, "dgHÉ 31.2–38.0 mol m⁻² d⁻¹ [Qj]", style);
    canvas.save();
    const Pixels pixels(file);
    int inked = 0;
    for (int y = 0; y < 100; ++y) {
      for (int x = 0; x < 900; ++x) {
        if (pixels.at(x, y) == rgb_of(ink::kPaper)) continue;
        ++inked;
        // Antialiasing may touch the next pixel; an accent over a capital rises by a fifth of the size.
        EXPECT_TRUE(box.grown(1.0 + 0.2 * style.size).holds({x + 0.5, y + 0.5, 0, 0})) << x << ", " << y;
        EXPECT_TRUE(x + 1.0 >= box.x - 1.0 && x <= box.right() + 1.0) << x;
      }
    }
    EXPECT_GT(inked, 500);
  }
}

TEST_F(CanvasTest, CutsTextToItsRoomAtACharacter) {
  const Canvas canvas(folder_ / "a.png", 100, 100);
  const TextStyle style{20.0};
  const std::string name = "Ærøskøbing øst på Ærø ⁻²⁻¹";
  EXPECT_EQ(canvas.fitted(name, 2000.0, style), name);
  for (double width = 30.0; width < 250.0; width += 7.0) {
    const std::string cut = canvas.fitted(name, width, style);
    EXPECT_LE(canvas.measure({}, cut, style).width, width);
    EXPECT_TRUE(cut.ends_with("…")) << cut;
    EXPECT_EQ(clean_text(cut), cut);
  }
  EXPECT_LE(canvas.measure({}, canvas.fitted(std::string(1000000, 'w'), 80.0, style), style).width, 80.0);
}

TEST_F(CanvasTest, BrokenTextStillDraws) {
  // Table 3-8 of the Unicode standard: each byte that begins no character is replaced.
  EXPECT_EQ(clean_text("a\xFFz"), "a\xEF\xBF\xBDz");
  EXPECT_EQ(clean_text("\xE2\x82"), "\xEF\xBF\xBD\xEF\xBF\xBD");
  EXPECT_EQ(clean_text("two\nlines\t!"), "two lines !");
  Canvas canvas(folder_ / "a.png", 100, 100);
  canvas.text({10, 50}, "\xC3\x28\xF0\x9F", {20.0});
  canvas.save();
  EXPECT_EQ(Pixels(folder_ / "a.png").width(), 100);
}

TEST_F(CanvasTest, KnowsWhatIsWritten) {
  Canvas canvas(folder_ / "a.png", 200, 100);
  const Box box = canvas.text({20, 50}, "here", {20.0});
  EXPECT_FALSE(canvas.is_free(box));
  EXPECT_TRUE(canvas.is_free({box.right() + 1.0, box.y, 10, 10}));
}

TEST_F(CanvasTest, HatchesInGreysOnly) {
  Canvas canvas(folder_ / "a.png", 100, 100);
  canvas.hatch({10, 10, 80, 80});
  canvas.save();
  const Pixels pixels(folder_ / "a.png");
  EXPECT_GT(pixels.count({10, 10, 80, 80}, ink::kHatchGround), 1000);
  EXPECT_LT(pixels.count({10, 10, 80, 80}, ink::kHatchGround), 6000);  // the rest are strokes
  EXPECT_EQ(pixels.count({0, 0, 100, 10}, ink::kPaper), 1000);
}

}  // namespace
}  // namespace sunfall
