#include "daemon/intake/passed_file.hpp"

#include <sys/socket.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <cstring>

namespace slipledger::intake {
namespace {

constexpr std::size_t most_files = 4;  // sent along with one message; all but the first are closed

// The first file in the message; the others are closed.
PassedFile file_in(msghdr& message) {
    PassedFile first;
    for (cmsghdr* part = CMSG_FIRSTHDR(&message); part != nullptr; part = CMSG_NXTHDR(&message, part)) {
        if (part->cmsg_level != SOL_SOCKET || part->cmsg_type != SCM_RIGHTS) continue;
        const std::size_t count = (part->cmsg_len - CMSG_LEN(0)) / sizeof(int);
        for (std::size_t i = 0; i < count; ++i) {
            int file = -1;
            std::memcpy(&file, CMSG_DATA(part) + i * sizeof(int), sizeof file);
            PassedFile owned(file);
            if (!first) first = std::move(owned);
        }
    }
    return first;
}

}  // namespace

PassedFile::~PassedFile() {
    if (file_ >= 0) ::close(file_);
}

ReceivedBytes receive_with_file(int socket, std::span<char> space) {
    alignas(cmsghdr) std::array<char, CMSG_SPACE(most_files * sizeof(int))> control{};
    iovec bytes{space.data(), space.size()};
    msghdr message{};
    message.msg_iov = &bytes;
    message.msg_iovlen = 1;
    message.msg_control = control.data();
    message.msg_controllen = control.size();
    ReceivedBytes received;
    received.size = ::recvmsg(socket, &message, MSG_DONTWAIT | MSG_CMSG_CLOEXEC);
    if (received.size >= 0) received.file = file_in(message);
    return received;
}

bool send_with_file(int socket, std::string_view text, int file) {
    alignas(cmsghdr) std::array<char, CMSG_SPACE(sizeof(int))> control{};
    iovec bytes{const_cast<char*>(text.data()), text.size()};
    msghdr message{};
    message.msg_iov = &bytes;
    message.msg_iovlen = 1;
    message.msg_control = control.data();
    message.msg_controllen = control.size();
    cmsghdr* part = CMSG_FIRSTHDR(&message);
    part->cmsg_level = SOL_SOCKET;
    part->cmsg_type = SCM_RIGHTS;
    part->cmsg_len = CMSG_LEN(sizeof(int));
    std::memcpy(CMSG_DATA(part), &file, sizeof file);
    ssize_t sent = ::sendmsg(socket, &message, MSG_NOSIGNAL);
    while (sent >= 0 && static_cast<std::size_t>(sent) < text.size()) {
        text.remove_prefix(static_cast<std::size_t>(sent));
        sent = ::send(socket, text.data(), text.size(), MSG_NOSIGNAL);
    }
    return sent >= 0;
}

}  // namespace slipledger::intake
