// Files appear whole or not at all, and their fingerprints are right.

#include "core/whole_file.h"

#include <gtest/gtest.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <csignal>
#include <fstream>
#include <iterator>
#include <string>

#include "core/fingerprint.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

namespace fs = std::filesystem;

class WholeFileTest : public testing::Test {
 protected:
  void SetUp() override {
    std::string pattern = (fs::path(testing::TempDir()) / "sunfall-whole-XXXXXX").string();
    ASSERT_NE(::mkdtemp(pattern.data()), nullptr);
    folder_ = pattern;
  }
  void TearDown() override { fs::remove_all(folder_); }

  static std::string content(const fs::path& file) {
    std::ifstream in(file, std::ios::binary);
    return {std::istreambuf_iterator<char>(in), {}};
  }
  std::ptrdiff_t entries() const { return std::distance(fs::directory_iterator(folder_), {}); }

  fs::path folder_;
};

TEST_F(WholeFileTest, WritesEveryByteAndLeavesNothingElse) {
  const std::string bytes("a\0b\r\n\xFF", 6);
  write_whole_file(folder_ / "file", bytes);
  EXPECT_EQ(content(folder_ / "file"), bytes);
  write_whole_file(folder_ / "file", "");
  EXPECT_EQ(content(folder_ / "file"), "");
  EXPECT_EQ(entries(), 1);
}

TEST_F(WholeFileTest, TakesNamesAsLongAsTheSystemAllows) {
  const fs::path file = folder_ / std::string(255, 'n');
  write_whole_file(file, "x");
  EXPECT_EQ(content(file), "x");
}

TEST_F(WholeFileTest, HasThePermissionsOfAnOrdinaryNewFile) {
  write_whole_file(folder_ / "whole", "x");
  std::ofstream(folder_ / "plain") << "x";
  EXPECT_EQ(fs::status(folder_ / "whole").permissions(), fs::status(folder_ / "plain").permissions());
}

TEST_F(WholeFileTest, WithoutCommitTheOldFileStays) {
  write_whole_file(folder_ / "file", "old");
  {
    const WholeFile whole(folder_ / "file");
    std::ofstream(whole.temporary()) << "new";
    EXPECT_EQ(whole.temporary().parent_path(), folder_);
    EXPECT_EQ(whole.temporary().filename().string().front(), '.');
  }
  EXPECT_EQ(content(folder_ / "file"), "old");
  EXPECT_EQ(entries(), 1);
}

TEST_F(WholeFileTest, AMissingFolderIsAnIoErrorThatNamesTheFile) {
  try {
    write_whole_file(folder_ / "none" / "file", "x");
    FAIL() << "no error";
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::io);
    EXPECT_EQ(error.parts().where, (folder_ / "none" / "file").string());
    EXPECT_EQ(error.parts().found, "No such file or directory");
  }
}

TEST_F(WholeFileTest, NeverReplacesWhatIsNoOrdinaryFile) {
  fs::create_directory(folder_ / "sub");
  ASSERT_EQ(::mkfifo((folder_ / "pipe").c_str(), 0600), 0);
  EXPECT_THROW(write_whole_file(folder_ / "sub", "x"), Error);
  EXPECT_THROW(write_whole_file(folder_ / "pipe", "x"), Error);
  EXPECT_TRUE(fs::is_fifo(folder_ / "pipe"));
  EXPECT_EQ(entries(), 2);
}

// The kernel's file size limit stands for a full disk: the write fails in the middle.
TEST_F(WholeFileTest, AWriteThatFailsInTheMiddleLeavesTheOldFile) {
  write_whole_file(folder_ / "file", "old");
  const pid_t child = ::fork();
  ASSERT_GE(child, 0);
  if (child == 0) {
    std::signal(SIGXFSZ, SIG_IGN);  // else the limit kills instead of failing the write
    const rlimit limit{4096, 4096};
    ::setrlimit(RLIMIT_FSIZE, &limit);
    int status = 1;
    try {
      write_whole_file(folder_ / "file", std::string(100000, 'n'));
    } catch (const Error& error) {
      status = error.kind() == ErrorKind::io && error.parts().found == "File too large" ? 0 : 2;
    }
    ::_exit(status);
  }
  int status = -1;
  ASSERT_EQ(::waitpid(child, &status, 0), child);
  ASSERT_TRUE(WIFEXITED(status));
  EXPECT_EQ(WEXITSTATUS(status), 0);
  EXPECT_EQ(content(folder_ / "file"), "old");
  EXPECT_EQ(entries(), 1);
}

// FIPS 180-4's example messages for SHA-256 as NIST publishes them: "abc", 448 bits, a million 'a';
// and the empty message.
TEST_F(WholeFileTest, FingerprintsAgreeWithThePublishedExamples) {
  const auto sha256_of = [&](const std::string& bytes) {
    write_whole_file(folder_ / "file", bytes);
    const Fingerprint print = fingerprint(folder_ / "file");
    EXPECT_EQ(print.size, bytes.size());
    return print.sha256;
  };
  EXPECT_EQ(sha256_of(""), "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
  EXPECT_EQ(sha256_of("abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
  EXPECT_EQ(sha256_of("abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq"),
            "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1");
  EXPECT_EQ(sha256_of(std::string(1000000, 'a')),
            "cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0");
}

// Longer than one piece of reading; the reference is coreutils' sha256sum.
TEST_F(WholeFileTest, FingerprintsLongFilesAsSha256sumDoes) {
  std::string bytes(3 * (1U << 20U) + 17, '\0');
  for (std::size_t i = 0; i < bytes.size(); ++i) bytes[i] = static_cast<char>(i * 131 + i / 977);
  write_whole_file(folder_ / "long", bytes);
  FILE* pipe = ::popen(("sha256sum '" + (folder_ / "long").string() + "'").c_str(), "r");
  ASSERT_NE(pipe, nullptr);
  char digits[65] = {};
  ASSERT_EQ(std::fread(digits, 1, 64, pipe), 64U);
  ::pclose(pipe);
  EXPECT_EQ(fingerprint(folder_ / "long").sha256, digits);
}

TEST_F(WholeFileTest, AFingerprintOfNothingIsAnError) {
  EXPECT_THROW(fingerprint(folder_ / "none"), Error);
  EXPECT_THROW(fingerprint(folder_), Error);
}

}  // namespace
}  // namespace sunfall
