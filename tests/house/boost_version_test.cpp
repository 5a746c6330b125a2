// Another Boost's headers may lie in /usr/include; every target must see ours.
#include <gtest/gtest.h>

#include <boost/url.hpp>
#include <boost/version.hpp>

TEST(Boost, IsTheVersionTheProjectIsWrittenFor) {
    EXPECT_EQ(BOOST_VERSION / 100, 1081) << BOOST_LIB_VERSION;
    EXPECT_EQ(boost::urls::url_view("http://localhost:80/hook").encoded_path(), "/hook");
}
